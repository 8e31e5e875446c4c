import { z } from 'zod';
import { emailField } from '../fields';

export const requestResetInput = z.strictObject({ email: emailField });
export type RequestResetInput = z.infer<typeof requestResetInput>;
