import { route } from '@/lib/endpoint';
import { createdAnswer } from '@/lib/http/created-answer';
import { removeMemberInput } from '@/lib/rules/inputs/remove-member';
import { setMemberInput } from '@/lib/rules/inputs/set-member';
import { removeMember } from '@/lib/shows/remove-member';
import { setMember } from '@/lib/shows/set-member';

export const PUT = route(setMemberInput, createdAnswer(setMember));
export const DELETE = route(removeMemberInput, removeMember, { status: 204 });
