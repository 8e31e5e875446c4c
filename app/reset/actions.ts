'use server';

import { action } from '@/lib/endpoint';
import { requestResetInput } from '@/lib/rules/inputs/request-reset';
import { resetPasswordInput } from '@/lib/rules/inputs/reset-password';
import { requestReset } from '@/lib/users/request-reset';
import { resetPassword } from '@/lib/users/reset-password';

export const requestResetAction = action(requestResetInput, requestReset);
export const resetPasswordAction = action(resetPasswordInput, resetPassword);
