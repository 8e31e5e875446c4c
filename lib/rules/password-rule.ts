import { z } from 'zod';

export const PASSWORD_LENGTH = 10;

/** The rule as a sentence, said beside every field that takes a new password. */
export const PASSWORD_SENTENCE = `At least ${PASSWORD_LENGTH} characters, and not your e-mail address.`;

export const passwordField = z
  .string()
  .min(PASSWORD_LENGTH, `A password has at least ${PASSWORD_LENGTH} characters.`)
  .max(1024, 'A password has at most 1024 characters.');

/** Whether the password is no more than the e-mail address, or its part before the @, written down again. */
export function isTheEmail(password: string, email: string): boolean {
  const bare = password.trim().toLowerCase();
  const address = email.trim().toLowerCase();
  return bare === address || bare === address.split('@')[0];
}

export const EMAIL_AS_PASSWORD = 'The password may not be the e-mail address.';
