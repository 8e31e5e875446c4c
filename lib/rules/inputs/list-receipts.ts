import { z } from 'zod';
import { showRef } from '../fields';

/** A show's hand-offs, newest first. */
export const listReceiptsInput = z.strictObject({
  show: showRef,
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(500, 'limit is at most 500.').default(100),
  cursor: z.string().max(200).optional(),
});
export type ListReceiptsInput = z.infer<typeof listReceiptsInput>;
