'use server';

import { action } from '@/lib/endpoint';
import { sendMailAgain } from '@/lib/mail/send-mail-again';
import { sendMailAgainInput } from '@/lib/rules/inputs/send-mail-again';

export const sendMailAgainAction = action(sendMailAgainInput, sendMailAgain);
