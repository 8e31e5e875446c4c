import { beforeAll, describe, expect, test } from 'vitest';
import { database } from '@/db/client';
import { systemContext } from '@/lib/auth/system-context';
import type { Context } from '@/lib/context';
import { listMails } from '@/lib/mail/list-mails';
import { StudioError } from '@/lib/rules/studio-error';
import { setMember } from '@/lib/shows/set-member';
import { getStudioState } from '@/lib/studio/get-studio-state';
import { addToken } from '@/lib/tokens/add-token';
import { addUser } from '@/lib/users/add-user';
import { disableUser } from '@/lib/users/disable-user';
import { enableUser } from '@/lib/users/enable-user';
import { inviteUser } from '@/lib/users/invite-user';
import { listUsers } from '@/lib/users/list-users';
import { setAdmin } from '@/lib/users/set-admin';
import { rowsOf } from '../support/api';
import { addMember, CALLERS, contextOf, createCast, createUser, type Caller, type Cast } from '../support/cast';
import { asOwner } from '../support/database';

const TABLES = ['users', 'members', 'mails', 'one_time_links', 'audit_events', 'audit_items', 'api_tokens'];

let cast: Cast;
beforeAll(async () => {
  cast = await createCast();
});

function contextFor(caller: Caller): Context {
  return caller === 'nobody' ? { ...cast.contextOf('admin'), actor: null } : cast.contextOf(caller);
}

/** Verbs that are an admin's alone, each on a person of its own. */
const VERBS: [string, (context: Context) => Promise<() => Promise<unknown>>][] = [
  ['addUser', async (context) => () => addUser(context, { email: `added-${Math.random()}@oxbarrow.example`, admin: true })],
  ['inviteUser', async (context) => invitee(({ email }) => inviteUser(context, { email }))],
  ['disableUser', async (context) => invitee(({ email }) => disableUser(context, { email }))],
  [
    'enableUser',
    async (context) => {
      const { email } = await createUser();
      await asOwner('update users set disabled_at = now() where email = $1', [email]);
      return () => enableUser(context, { email });
    },
  ],
  ['setAdmin', async (context) => invitee(({ email }) => setAdmin(context, { email, admin: true }))],
  ['listUsers', async (context) => () => listUsers(context, { q: '' })],
  ['listMails', async (context) => () => listMails(context, { page: 1 })],
  ['getStudioState', async (context) => () => getStudioState(context)],
];

async function invitee(act: (user: { email: string }) => Promise<unknown>): Promise<() => Promise<unknown>> {
  const user = await createUser();
  return () => act(user);
}

describe.each(VERBS)('%s', (_name, prepare) => {
  test.each(CALLERS)('by %s', async (caller) => {
    const act = await prepare(contextFor(caller));
    const before = await rowsOf(...TABLES);
    if (caller === 'admin') return void (await act());
    const refused = await act().catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(StudioError);
    expect(refused).toMatchObject({ code: caller === 'nobody' ? 'not_signed_in' : 'forbidden' });
    expect(await rowsOf(...TABLES)).toBe(before);
  });
});

describe('nobody is locked out', () => {
  test('the last admin can be neither disabled nor demoted, of two who try each other at once one stays', async () => {
    await asOwner('update users set is_admin = false');
    const [one, two] = [await createUser({ isAdmin: true }), await createUser({ isAdmin: true })];
    const outcomes = await Promise.allSettled([disableUser(contextOf(one), { email: two.email }), setAdmin(contextOf(two), { email: one.email, admin: false })]);
    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(1);
    const left = await asOwner<{ email: string }>('select email from users where is_admin and disabled_at is null');
    expect(left).toHaveLength(1);
    const last = left[0].email === one.email ? one : two;
    await expect(disableUser(contextOf(last), { email: last.email })).rejects.toMatchObject({ code: 'conflict', field: 'email' });
    await expect(setAdmin(contextOf(last), { email: last.email, admin: false })).rejects.toMatchObject({ code: 'conflict', field: 'email' });
    await asOwner('update users set is_admin = true where id = $1', [cast.people.admin.id]);
  });

  test('who leads a show alone is named with it, and can go once somebody else leads', async () => {
    const other = await createCast();
    const admin = cast.contextOf('admin');
    await expect(disableUser(admin, { email: other.people.lead.email })).rejects.toThrow(`leads ${other.show.code} alone`);
    await addMember(other.show, await createUser(), 'lead');
    await disableUser(admin, { email: other.people.lead.email });
    // A lead who may not sign in leads nobody.
    const [{ email }] = await asOwner<{ email: string }>(
      `select u.email from members m join users u on u.id = m.user_id where m.show_id = $1 and m.role = 'lead' and u.disabled_at is null`,
      [other.show.id],
    );
    await expect(setMember(admin, { show: other.show.code, email, role: 'artist' })).rejects.toMatchObject({ code: 'conflict' });
  });

  test('an archived show holds nobody', async () => {
    const other = await createCast({ archivedAt: new Date() });
    await disableUser(cast.contextOf('admin'), { email: other.people.lead.email });
  });
});

describe('the command line', () => {
  test('adds people and tokens before anybody is there, and history keeps the acts without a person', async () => {
    const system = systemContext(database());
    const user = await addUser(system, { email: 'first@oxbarrow.example', name: 'First', admin: true });
    const made = await addToken(system, { user: user.email, name: 'farm', days: 7 });
    expect(made.token).toMatch(/^wh_[\w-]{43}$/);
    expect(await asOwner(`select act, actor_id from audit_events where subject = 'first@oxbarrow.example' order by id`)).toEqual([
      { act: 'add-user', actor_id: null },
      { act: 'add-token', actor_id: null },
    ]);
    await setMember(system, { show: cast.show.code, email: 'first@oxbarrow.example', role: 'td' });
  });

  test('an address is known in any case of letters', async () => {
    await addUser(cast.contextOf('admin'), { email: 'cased@oxbarrow.example', admin: false });
    await asOwner(`update users set email = 'Cased@oxbarrow.example' where email = 'cased@oxbarrow.example'`);
    await expect(addUser(cast.contextOf('admin'), { email: 'cased@oxbarrow.example', admin: false })).rejects.toMatchObject({ code: 'already_exists', field: 'email' });
    await disableUser(cast.contextOf('admin'), { email: 'cased@oxbarrow.example' });
    expect(await asOwner(`select 1 from users where lower(email) = 'cased@oxbarrow.example' and disabled_at is not null`)).toHaveLength(1);
  });
});

test('the list of people counts live tokens and names roles', async () => {
  const other = await createCast();
  await asOwner(`insert into api_tokens (user_id, name, token_hash, revoked_at, expires_at) values ($1, 'r', 'h1', now(), null), ($1, 'e', 'h2', null, now())`, [other.people.td.id]);
  const { items } = await listUsers(cast.contextOf('admin'), { q: other.people.td.email });
  expect(items).toEqual([{ email: other.people.td.email, name: other.people.td.name, admin: false, state: 'invited', shows: [{ code: other.show.code, role: 'td' }], tokens: 1 }]);
  expect((await listUsers(cast.contextOf('admin'), { q: '%' })).items).toEqual([]);
});
