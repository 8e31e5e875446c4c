import { z } from 'zod';

export const listMailsInput = z.strictObject({ page: z.coerce.number().int().min(1).max(10_000).default(1) });
export type ListMailsInput = z.infer<typeof listMailsInput>;
