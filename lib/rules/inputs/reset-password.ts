import { z } from 'zod';
import { secretField } from '../fields';
import { passwordField } from '../password-rule';

export const resetPasswordInput = z.strictObject({ secret: secretField, password: passwordField });
export type ResetPasswordInput = z.infer<typeof resetPasswordInput>;
