import { randomUUID } from 'node:crypto';
import { database } from '@/db/client';
import { apiTokens } from '@/db/schema/api-tokens';
import { members } from '@/db/schema/members';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import { newSecret, secretHash } from '@/lib/auth/secret-hash';
import type { ActorContext } from '@/lib/context';
import type { Role } from '@/lib/rules/roles';

/** Everybody who may call: the studio's admin, a member of each role, a user who is not in the show, and nobody. */
export const CALLERS = ['admin', 'lead', 'td', 'artist', 'guest', 'outsider', 'nobody'] as const;
export type Caller = (typeof CALLERS)[number];
export type Person = Exclude<Caller, 'nobody'>;

export interface TestUser {
  id: string;
  email: string;
  name: string;
  isAdmin: boolean;
  /** A bearer token of theirs. */
  token: string;
}

type ShowRow = typeof shows.$inferSelect;

/** A user without a password, with a token. Tests that sign in set the password themselves. */
export async function createUser(options: { email?: string; name?: string; isAdmin?: boolean } = {}): Promise<TestUser> {
  const email = options.email ?? `user-${randomUUID().slice(0, 8)}@oxbarrow.example`;
  const [row] = await database()
    .insert(users)
    .values({ email, name: options.name ?? email.split('@')[0], isAdmin: options.isAdmin ?? false })
    .returning();
  const token = newSecret('wh_');
  await database().insert(apiTokens).values({ userId: row.id, name: 'test', tokenHash: secretHash(token) });
  return { id: row.id, email: row.email, name: row.name, isAdmin: row.isAdmin, token };
}

export async function createShowRow(options: Partial<typeof shows.$inferInsert> = {}): Promise<ShowRow> {
  const code = options.code ?? `show${randomUUID().slice(0, 8)}`;
  const [row] = await database()
    .insert(shows)
    .values({ title: `Show ${code}`, linearUnit: 'cm', upAxis: 'y', scheme: 'catmull-clark', ...options, code })
    .returning();
  return row;
}

export async function addMember(show: { id: string }, user: { id: string }, role: Role, limits: { shots?: string[]; assets?: string[] } = {}): Promise<void> {
  await database().insert(members).values({ showId: show.id, userId: user.id, role, ...limits });
}

export interface Cast {
  show: ShowRow;
  people: Record<Person, TestUser>;
  /** The caller's bearer token; null for nobody. */
  tokenOf: (caller: Caller) => string | null;
  /** A context to call a verb with, without a route between. */
  contextOf: (person: Person) => ActorContext;
}

/** A show with one person per role, an admin and an outsider who leads another show. */
export async function createCast(showOptions: Partial<typeof shows.$inferInsert> = {}): Promise<Cast> {
  const show = await createShowRow(showOptions);
  const mark = randomUUID().slice(0, 8);
  const make = (who: Person) => createUser({ email: `${who}-${mark}@oxbarrow.example`, name: `${who} ${mark}`, isAdmin: who === 'admin' });
  const people: Record<Person, TestUser> = {
    admin: await make('admin'),
    lead: await make('lead'),
    td: await make('td'),
    artist: await make('artist'),
    guest: await make('guest'),
    outsider: await make('outsider'),
  };
  for (const role of ['lead', 'td', 'artist', 'guest'] as const) await addMember(show, people[role], role);
  await addMember(await createShowRow(), people.outsider, 'lead');
  return {
    show,
    people,
    tokenOf: (caller) => (caller === 'nobody' ? null : people[caller].token),
    contextOf: (person) => contextOf(people[person]),
  };
}

export function contextOf(user: TestUser): ActorContext {
  return {
    db: database(),
    actor: { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'token', tokenId: null },
    origin: 'api',
    requestId: randomUUID(),
  };
}
