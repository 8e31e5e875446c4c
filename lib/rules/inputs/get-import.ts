import { z } from 'zod';
import { importRefInput } from './import-ref';

/** One import with its files; with `since`, the mark of an earlier answer, only those that changed after it. */
export const getImportInput = importRefInput.extend({ since: z.string().regex(/^\d{1,18}$/, 'since is the mark of an earlier answer.').optional() });
export type GetImportInput = z.infer<typeof getImportInput>;
