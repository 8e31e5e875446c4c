import { z } from 'zod';
import { emailField } from '../fields';

export const disableUserInput = z.strictObject({ email: emailField });
export type DisableUserInput = z.infer<typeof disableUserInput>;
