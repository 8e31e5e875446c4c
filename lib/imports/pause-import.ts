import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import { imports } from '@/db/schema/imports';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { ImportRefInput } from '@/lib/rules/inputs/import-ref';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { describeImport } from './describe-import';
import { getImportRow } from './get-import-row';
import { notifyImport } from './notify-import';

/**
 * Leaves the waiting files of a submitted import alone until it is resumed; files that are being measured come to their end. Its state stays what it is,
 * `paused` says so. Twice is as once. Errors: conflict for an import that was not submitted yet, or is over.
 */
export async function pauseImport(context: Context, input: ImportRefInput): Promise<ImportAnswer> {
  const known = requireActor(context);
  const { show } = await getShowAccess(context.db, known.actor, input.show, 'importCages');
  const row = await getImportRow(context.db, show.id, input.import);
  await context.db.transaction(async (tx) => {
    const [paused] = await tx
      .update(imports)
      .set({ pausedAt: sql`now()` })
      .where(and(eq(imports.id, row.id), inArray(imports.state, ['queued', 'running']), isNull(imports.pausedAt)))
      .returning({ id: imports.id });
    if (!paused) return;
    await recordEvent(tx, known, { showId: show.id, act: 'pause-import', subject: row.id });
    await notifyImport(tx, row.id);
  });
  const now = await getImportRow(context.db, show.id, row.id);
  if (now.state === 'open') throw new StudioError('conflict', 'This import was not submitted yet.');
  if (now.pausedAt === null) throw new StudioError('conflict', 'This import is over: there is nothing left to pause.');
  return describeImport(context.db, now);
}
