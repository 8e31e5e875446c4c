import { z } from 'zod';
import { MAIL_CHOICES } from '../mail-choices';

/** How the caller wants to be told of what happens. */
export const setMailChoiceInput = z.strictObject({ choice: z.enum(MAIL_CHOICES, `choice is one of ${MAIL_CHOICES.join(', ')}.`) });
export type SetMailChoiceInput = z.infer<typeof setMailChoiceInput>;
