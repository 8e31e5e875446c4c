import { z } from 'zod';
import { emailField } from '../fields';

/** A fresh invitation for somebody who has not followed the last one. */
export const inviteUserInput = z.strictObject({ email: emailField });
export type InviteUserInput = z.infer<typeof inviteUserInput>;
