import { z } from 'zod';

/** An e-mail address as it is stored and compared: trimmed, lower case. */
export const emailField = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, 'An e-mail address has at most 254 characters.')
  .regex(/^[^@\s]+@[^@\s]+$/, 'Give an e-mail address, such as name@studio.example.');

export const personNameField = z.string().trim().min(1, 'Give a name.').max(120, 'A name has at most 120 characters.');

export const showCodeField = z
  .string()
  .trim()
  .regex(/^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$/, 'A code starts with a letter or digit and has at most 32 letters, digits, _ or -.');

/** A show named in a path: whatever it is, it either exists for the caller or it does not. */
export const showRef = z.string().min(1).max(64);

/** Code of a shot or an asset. */
export const codeField = z.string().trim().min(1, 'Give a code.').max(128, 'A code has at most 128 characters.');

export const secretField = z.string().min(1).max(200);
