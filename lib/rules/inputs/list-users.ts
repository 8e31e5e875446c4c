import { z } from 'zod';

export const listUsersInput = z.strictObject({ q: z.string().trim().max(200).default('') });
export type ListUsersInput = z.infer<typeof listUsersInput>;
