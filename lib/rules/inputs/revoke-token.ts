import { z } from 'zod';

export const revokeTokenInput = z.strictObject({ id: z.uuid('A token’s id is a UUID.') });
export type RevokeTokenInput = z.infer<typeof revokeTokenInput>;
