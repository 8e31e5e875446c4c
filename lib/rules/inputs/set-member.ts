import { z } from 'zod';
import { codeField, emailField, personNameField, showRef } from '../fields';
import { ROLES } from '../roles';

/** Who may do what in a show; an address that nobody has yet is invited. */
export const setMemberInput = z
  .strictObject({
    show: showRef,
    email: emailField,
    role: z.enum(ROLES, `role is one of ${ROLES.join(', ')}.`),
    shots: z.array(codeField).max(1000).optional(),
    assets: z.array(codeField).max(1000).optional(),
    name: personNameField.optional(),
  })
  .refine((input) => input.role === 'guest' || !(input.shots?.length || input.assets?.length), {
    path: ['shots'],
    message: 'Only a guest is limited to shots and assets.',
  });
export type SetMemberInput = z.infer<typeof setMemberInput>;
