import { z } from 'zod';
import { FILE_FILTERS, FILE_SORTS } from '../import-answer';
import { importRefInput } from './import-ref';

/** A page of an import's files. `show` in the path is the show; `only` picks files by what needs to be done. */
export const listImportFilesInput = importRefInput.extend({
  only: z.enum(FILE_FILTERS, `only is one of ${FILE_FILTERS.join(', ')}.`).default('all'),
  q: z.string().trim().max(200, 'q has at most 200 characters.').default(''),
  sort: z.enum(FILE_SORTS, `sort is one of ${FILE_SORTS.join(', ')}.`).default('needs'),
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(500, 'limit is at most 500.').default(100),
  cursor: z.string().max(4000).optional(),
});
export type ListImportFilesInput = z.infer<typeof listImportFilesInput>;
