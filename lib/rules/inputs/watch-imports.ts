import { z } from 'zod';

const MOST_WATCHED = 24;
const WATCHED = /^([^/@,]{1,64})\/([^/@,]{1,64})(?:@(\d{1,18}))?$/;

/** One import that a browser watches, and how far it knows it already; an import page's answer has that mark. */
export interface WatchedImport {
  show: string;
  import: string;
  since: string | null;
}

/** Imports to follow in one stream: `show/import@mark`, joined by commas; without a mark the whole import is told first. */
export const watchImportsInput = z.strictObject({
  watch: z
    .string('watch names the imports to follow.')
    .min(1, 'watch names the imports to follow.')
    .transform((text, issues): WatchedImport[] => {
      const words = [...new Set(text.split(','))];
      if (words.length > MOST_WATCHED) issues.addIssue({ code: 'custom', message: `At most ${MOST_WATCHED} imports are followed at once.` });
      return words.map((word) => {
        const match = WATCHED.exec(word);
        if (!match) issues.addIssue({ code: 'custom', message: 'watch is a list of show/import or show/import@mark.' });
        return { show: match?.[1] ?? '', import: match?.[2] ?? '', since: match?.[3] ?? null };
      });
    }),
});
export type WatchImportsInput = z.infer<typeof watchImportsInput>;
