import { asc, eq, sql } from 'drizzle-orm';
import { members } from '@/db/schema/members';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListMembersInput } from '@/lib/rules/inputs/list-members';
import { ROLES, type Role } from '@/lib/rules/roles';
import { getShowAccess } from './get-show-access';

export interface ListedMember {
  email: string;
  name: string;
  role: Role;
  shots: string[];
  assets: string[];
  state: 'active' | 'invited' | 'disabled';
}

/** Everybody in a show, leads first. */
export async function listMembers(context: Context, input: ListMembersInput): Promise<ListedMember[]> {
  const { actor, db } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const rows = await db
    .select({ user: users, member: members })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(eq(members.showId, show.id))
    .orderBy(asc(sql`lower(${users.name})`), asc(users.email));
  const listed = rows.map(({ user, member }) => ({
    email: user.email,
    name: user.name,
    role: member.role,
    shots: member.shots,
    assets: member.assets,
    state: user.disabledAt ? ('disabled' as const) : user.passwordHash === null ? ('invited' as const) : ('active' as const),
  }));
  return listed.sort((a, b) => ROLES.indexOf(a.role) - ROLES.indexOf(b.role));
}
