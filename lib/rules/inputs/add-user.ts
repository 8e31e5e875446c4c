import { z } from 'zod';
import { emailField, personNameField } from '../fields';

/** A person who may sign in once they have followed the invitation. */
export const addUserInput = z.strictObject({
  email: emailField,
  name: personNameField.optional(),
  admin: z.boolean().default(false),
});
export type AddUserInput = z.infer<typeof addUserInput>;
