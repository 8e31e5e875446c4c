import { z } from 'zod';
import { emailField, showRef } from '../fields';

export const removeMemberInput = z.strictObject({ show: showRef, email: emailField });
export type RemoveMemberInput = z.infer<typeof removeMemberInput>;
