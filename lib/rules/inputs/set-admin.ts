import { z } from 'zod';
import { emailField } from '../fields';

export const setAdminInput = z.strictObject({ email: emailField, admin: z.boolean() });
export type SetAdminInput = z.infer<typeof setAdminInput>;
