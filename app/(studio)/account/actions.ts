'use server';

import { action } from '@/lib/endpoint';
import { addTokenInput } from '@/lib/rules/inputs/add-token';
import { changePasswordInput } from '@/lib/rules/inputs/change-password';
import { revokeTokenInput } from '@/lib/rules/inputs/revoke-token';
import { setMailChoiceInput } from '@/lib/rules/inputs/set-mail-choice';
import { addToken } from '@/lib/tokens/add-token';
import { revokeToken } from '@/lib/tokens/revoke-token';
import { changePassword } from '@/lib/users/change-password';
import { setMailChoice } from '@/lib/users/set-mail-choice';

export const addTokenAction = action(addTokenInput, addToken);
export const revokeTokenAction = action(revokeTokenInput, revokeToken);
export const changePasswordAction = action(changePasswordInput, changePassword);
export const setMailChoiceAction = action(setMailChoiceInput, setMailChoice);
