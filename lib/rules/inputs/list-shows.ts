import { z } from 'zod';

export const listShowsInput = z.strictObject({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().max(64).optional(),
});
export type ListShowsInput = z.infer<typeof listShowsInput>;
