'use server';

import { action } from '@/lib/endpoint';
import { addUserInput } from '@/lib/rules/inputs/add-user';
import { disableUserInput } from '@/lib/rules/inputs/disable-user';
import { enableUserInput } from '@/lib/rules/inputs/enable-user';
import { inviteUserInput } from '@/lib/rules/inputs/invite-user';
import { setAdminInput } from '@/lib/rules/inputs/set-admin';
import { addUser } from '@/lib/users/add-user';
import { disableUser } from '@/lib/users/disable-user';
import { enableUser } from '@/lib/users/enable-user';
import { inviteUser } from '@/lib/users/invite-user';
import { setAdmin } from '@/lib/users/set-admin';

export const addUserAction = action(addUserInput, addUser);
export const inviteUserAction = action(inviteUserInput, inviteUser);
export const disableUserAction = action(disableUserInput, disableUser);
export const enableUserAction = action(enableUserInput, enableUser);
export const setAdminAction = action(setAdminInput, setAdmin);
