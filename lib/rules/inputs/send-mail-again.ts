import { z } from 'zod';

export const sendMailAgainInput = z.strictObject({ id: z.uuid() });
export type SendMailAgainInput = z.infer<typeof sendMailAgainInput>;
