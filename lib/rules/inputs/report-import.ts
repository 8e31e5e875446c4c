import { z } from 'zod';
import { REPORT_LEVELS } from '../import-report';
import { importRefInput } from './import-ref';

/** An import's report. `guard=1` puts an apostrophe before text that a spreadsheet would run: for people, never for scripts. */
export const reportImportInput = importRefInput.extend({
  level: z.enum(REPORT_LEVELS, `level is one of ${REPORT_LEVELS.join(', ')}.`).default('all'),
  guard: z.enum(['0', '1'], 'guard is 0 or 1.').default('0'),
});
export type ReportImportInput = z.infer<typeof reportImportInput>;
