import { z } from 'zod';
import { emailField } from '../fields';

export const enableUserInput = z.strictObject({ email: emailField });
export type EnableUserInput = z.infer<typeof enableUserInput>;
