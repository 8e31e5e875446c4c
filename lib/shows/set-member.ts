import { and, eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { members } from '@/db/schema/members';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import type { SetMemberInput } from '@/lib/rules/inputs/set-member';
import type { Role } from '@/lib/rules/roles';
import { findOrMakeUser } from '@/lib/users/find-or-make-user';
import { getShowAccess } from './get-show-access';
import { lockShow, refuseLastLead } from './refuse-last-lead';
import { tellMember } from './tell-member';

type Member = typeof members.$inferSelect;

export interface MemberAnswer {
  email: string;
  name: string;
  role: Role;
  shots: string[];
  assets: string[];
  /** The person has not chosen a password yet. */
  invited: boolean;
}

/**
 * Gives a person a role in the show, whatever they had before; who is unknown gets an account and an invitation.
 * The same call again changes nothing and tells nobody. Refused where it would leave the show without a lead.
 * @returns the member, and whether they are new to the show
 */
export async function setMember(context: Context, input: SetMemberInput): Promise<MemberAnswer & { created: boolean }> {
  const known = requireActor(context);
  return known.db.transaction(async (tx) => {
    const { show } = await getShowAccess(tx, known.actor, input.show, 'editMembers');
    await lockShow(tx, show.id);
    const { user } = await findOrMakeUser(tx, input.email, input.name);
    const before = await findMember(tx, show.id, user.id);
    const shots = sorted(input.role === 'guest' ? (input.shots ?? before?.shots ?? []) : []);
    const assets = sorted(input.role === 'guest' ? (input.assets ?? before?.assets ?? []) : []);
    const items = changes(before, { role: input.role, shots, assets });
    if (before?.role === 'lead' && input.role !== 'lead') await refuseLastLead(tx, show, user.id);
    if (items.length > 0) {
      await tx
        .insert(members)
        .values({ showId: show.id, userId: user.id, role: input.role, shots, assets })
        .onConflictDoUpdate({ target: [members.showId, members.userId], set: { role: sql`excluded.role`, shots: sql`excluded.shots`, assets: sql`excluded.assets` } });
      await recordEvent(tx, known, { showId: show.id, act: 'set-member', subject: user.email, items });
    }
    if (!before) await tellMember(tx, known.actor, user, show, input.role);
    return { email: user.email, name: user.name, role: input.role, shots, assets, invited: user.passwordHash === null, created: !before };
  });
}

async function findMember(tx: Transaction, showId: string, userId: string): Promise<Member | null> {
  const [found] = await tx
    .select()
    .from(members)
    .where(and(eq(members.showId, showId), eq(members.userId, userId)));
  return found ?? null;
}

function sorted(codes: string[]): string[] {
  return [...new Set(codes)].sort();
}

function changes(before: Member | null, after: { role: Role; shots: string[]; assets: string[] }): ChangedField[] {
  const list = (codes: string[] | undefined) => (codes?.length ? codes.join(', ') : null);
  const all: ChangedField[] = [
    { field: 'role', before: before?.role ?? null, after: after.role },
    { field: 'shots', before: list(before?.shots), after: list(after.shots) },
    { field: 'assets', before: list(before?.assets), after: list(after.assets) },
  ];
  return all.filter((item) => item.before !== item.after);
}
