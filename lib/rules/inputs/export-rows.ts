import { z } from 'zod';
import { showRef } from '../fields';
import { categoryFilter, stateFilter } from './list-parts';

/** A show's values as a file. `guard=1` puts an apostrophe before text that a spreadsheet would run; for people, never for scripts. */
export const exportRowsInput = z.strictObject({
  show: showRef,
  state: stateFilter.refine((states) => !states.includes('left_out'), 'state: Parts that are left out are in no export.').optional(),
  category: categoryFilter.optional(),
  asset: z.string().min(1).max(128).optional(),
  guard: z.enum(['0', '1'], 'guard is 0 or 1.').default('0'),
  profile: z
    .string()
    .refine(() => false, 'There are no consumer profiles yet; leave profile out for SI in the asset’s axes.')
    .optional(),
});
export type ExportRowsInput = z.infer<typeof exportRowsInput>;
