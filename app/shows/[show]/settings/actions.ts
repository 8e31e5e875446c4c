'use server';

import { action } from '@/lib/endpoint';
import { editShowInput } from '@/lib/rules/inputs/edit-show';
import { removeMemberInput } from '@/lib/rules/inputs/remove-member';
import { setMemberInput } from '@/lib/rules/inputs/set-member';
import { editShow } from '@/lib/shows/edit-show';
import { removeMember } from '@/lib/shows/remove-member';
import { setMember } from '@/lib/shows/set-member';

export const editShowAction = action(editShowInput, editShow);
export const setMemberAction = action(setMemberInput, setMember);
export const removeMemberAction = action(removeMemberInput, removeMember);
