import { and, eq, sql } from 'drizzle-orm';
import { members } from '@/db/schema/members';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { RemoveMemberInput } from '@/lib/rules/inputs/remove-member';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from './get-show-access';
import { lockShow, refuseLastLead } from './refuse-last-lead';

/** Takes a person out of the show; what they did there stands. Refused for its last lead. */
export async function removeMember(context: Context, input: RemoveMemberInput): Promise<void> {
  const known = requireActor(context);
  await known.db.transaction(async (tx) => {
    const { show } = await getShowAccess(tx, known.actor, input.show, 'editMembers');
    await lockShow(tx, show.id);
    const [member] = await tx
      .select({ userId: members.userId, role: members.role, email: users.email })
      .from(members)
      .innerJoin(users, eq(users.id, members.userId))
      .where(and(eq(members.showId, show.id), sql`lower(${users.email}) = ${input.email}`));
    if (!member) throw new StudioError('not_found', `${input.email} is not in ${show.code}.`, { field: 'email' });
    if (member.role === 'lead') await refuseLastLead(tx, show, member.userId);
    await tx.delete(members).where(and(eq(members.showId, show.id), eq(members.userId, member.userId)));
    await recordEvent(tx, known, { showId: show.id, act: 'remove-member', subject: member.email, items: [{ field: 'role', before: member.role, after: null }] });
  });
}
