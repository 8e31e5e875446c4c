import { z } from 'zod';
import { showRef } from '../fields';

/** Materials that a show may use: its own and the studio's. */
export const listMaterialsInput = z.strictObject({
  show: showRef,
  q: z.string().trim().max(200, 'q has at most 200 characters.').optional(),
  category: z.string().min(1).max(100).optional(),
  limit: z.coerce.number('limit is a number.').int('limit is a whole number.').min(1).max(1000, 'limit is at most 1000.').default(500),
  cursor: z.string().max(1000).optional(),
});
export type ListMaterialsInput = z.infer<typeof listMaterialsInput>;
