import { z } from 'zod';
import { passwordField } from '../password-rule';

export const changePasswordInput = z.strictObject({
  current: z.string().min(1, 'Give the password you have now.').max(1024),
  password: passwordField,
});
export type ChangePasswordInput = z.infer<typeof changePasswordInput>;
