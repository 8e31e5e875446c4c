import { z } from 'zod';
import { emailField, personNameField } from '../fields';
import { EMAIL_AS_PASSWORD, isTheEmail, passwordField } from '../password-rule';

/** The first person of a studio that has nobody yet. */
export const createFirstAdminInput = z
  .strictObject({ email: emailField, name: personNameField, password: passwordField })
  .refine((input) => !isTheEmail(input.password, input.email), { path: ['password'], message: EMAIL_AS_PASSWORD });
export type CreateFirstAdminInput = z.infer<typeof createFirstAdminInput>;
