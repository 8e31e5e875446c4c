import { asc, desc, eq, ilike, inArray, or, sql } from 'drizzle-orm';
import { members } from '@/db/schema/members';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import type { ListUsersInput } from '@/lib/rules/inputs/list-users';
import type { Role } from '@/lib/rules/roles';

export interface ListedUser {
  email: string;
  name: string;
  admin: boolean;
  /** `invited` until they have chosen a password. */
  state: 'active' | 'invited' | 'disabled';
  shows: { code: string; role: Role }[];
  tokens: number;
}

const MOST = 1000;

/** The studio's people by name, disabled ones last, with the shows they are in. */
export async function listUsers(context: Context, input: ListUsersInput): Promise<{ items: ListedUser[]; more: boolean }> {
  const { db } = requireAdmin(context, 'editUsers');
  const like = `%${input.q.replace(/[\\%_]/g, '\\$&')}%`;
  const found = await db
    .select({
      user: users,
      // Spelt out: without a join Drizzle writes columns bare, and a bare id would be the inner table's.
      tokens: sql<number>`(select count(*)::int from api_tokens t where t.user_id = users.id and t.revoked_at is null and (t.expires_at is null or t.expires_at > now()))`,
    })
    .from(users)
    .where(input.q ? or(ilike(users.name, like), ilike(users.email, like)) : undefined)
    .orderBy(desc(sql`${users.disabledAt} is null`), asc(sql`lower(${users.name})`), asc(users.email))
    .limit(MOST + 1);
  const rows = found.slice(0, MOST);
  const roles = rows.length
    ? await db
        .select({ userId: members.userId, code: shows.code, role: members.role })
        .from(members)
        .innerJoin(shows, eq(shows.id, members.showId))
        .where(inArray(members.userId, rows.map((row) => row.user.id)))
        .orderBy(asc(shows.code))
    : [];
  const items = rows.map(({ user, tokens }) => ({
    email: user.email,
    name: user.name,
    admin: user.isAdmin,
    state: user.disabledAt ? ('disabled' as const) : user.passwordHash === null ? ('invited' as const) : ('active' as const),
    shows: roles.filter((role) => role.userId === user.id).map(({ code, role }) => ({ code, role })),
    tokens,
  }));
  return { items, more: found.length > MOST };
}
