import { z } from 'zod';
import { emailField } from '../fields';

/** A token of one's own; only the command line names another user. */
export const addTokenInput = z.strictObject({
  name: z.string().trim().min(1, 'Say what the token is for.').max(80, 'A token’s name has at most 80 characters.'),
  days: z
    .number()
    .int('Give whole days.')
    .min(1, 'A token lasts at least a day.')
    .max(3650, 'A token lasts at most 3650 days.')
    .nullish(),
  user: emailField.optional(),
});
export type AddTokenInput = z.infer<typeof addTokenInput>;
