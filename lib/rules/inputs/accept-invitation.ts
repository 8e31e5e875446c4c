import { z } from 'zod';
import { personNameField, secretField } from '../fields';
import { passwordField } from '../password-rule';

export const acceptInvitationInput = z.strictObject({ secret: secretField, name: personNameField, password: passwordField });
export type AcceptInvitationInput = z.infer<typeof acceptInvitationInput>;
