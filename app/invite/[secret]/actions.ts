'use server';

import { action } from '@/lib/endpoint';
import { acceptInvitationInput } from '@/lib/rules/inputs/accept-invitation';
import { acceptInvitation } from '@/lib/users/accept-invitation';

export const acceptInvitationAction = action(acceptInvitationInput, acceptInvitation);
