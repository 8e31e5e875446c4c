import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import { database } from '@/db/client';
import { findLink } from '@/lib/auth/find-link';
import { verifyCredentials } from '@/lib/auth/verify-credentials';
import type { Context } from '@/lib/context';
import { acceptInvitation } from '@/lib/users/accept-invitation';
import { addUser } from '@/lib/users/add-user';
import { disableUser } from '@/lib/users/disable-user';
import { inviteUser } from '@/lib/users/invite-user';
import { requestReset } from '@/lib/users/request-reset';
import { resetPassword } from '@/lib/users/reset-password';
import { contextOf, createUser, type TestUser } from '../support/cast';
import { asOwner } from '../support/database';

const PASSWORD = 'ferrow tarn bell';
let admin: TestUser;

beforeAll(async () => {
  admin = await createUser({ isAdmin: true });
});

const nobody = (): Context => ({ db: database(), actor: null, origin: 'hand', requestId: randomUUID() });
const newEmail = () => `new-${randomUUID().slice(0, 8)}@oxbarrow.example`;

/** The secrets of the links that were mailed to an address, the oldest first. */
async function mailedSecrets(email: string, purpose: 'invite' | 'reset'): Promise<string[]> {
  const rows = await asOwner<{ text: string; html: string }>('select text, html from mails where to_email = $1 order by created_at', [email]);
  return rows.flatMap(({ text, html }) => {
    const secret = new RegExp(`http://127\\.0\\.0\\.1:3000/${purpose}/([\\w-]+)`).exec(text)?.[1];
    if (secret) expect(html).toContain(`/${purpose}/${secret}"`);
    return secret ? [secret] : [];
  });
}

async function invited(): Promise<{ email: string; secret: string }> {
  const email = newEmail();
  await addUser(contextOf(admin), { email, name: 'Hesta Quoin', admin: false });
  return { email, secret: (await mailedSecrets(email, 'invite'))[0] };
}

describe('an invitation', () => {
  test('gives a name and a password once, and is used from then on', async () => {
    const { email, secret } = await invited();
    expect(await findLink(database(), 'invite', secret)).toEqual({ state: 'good', email, name: 'Hesta Quoin' });
    expect(await verifyCredentials(database(), email, PASSWORD)).toEqual({ state: 'refused' });
    expect(await acceptInvitation(nobody(), { secret, name: 'Hesta', password: PASSWORD })).toEqual({ email });
    expect(await verifyCredentials(database(), email, PASSWORD)).toMatchObject({ state: 'fits', user: { name: 'Hesta' } });
    expect((await findLink(database(), 'invite', secret)).state).toBe('used');
    await expect(acceptInvitation(nobody(), { secret, name: 'Other', password: 'another password' })).rejects.toMatchObject({ code: 'conflict' });
    expect(await verifyCredentials(database(), email, PASSWORD)).toMatchObject({ state: 'fits', user: { name: 'Hesta' } });
  });

  test('is not spent by a password that is refused', async () => {
    const { email, secret } = await invited();
    await expect(acceptInvitation(nobody(), { secret, name: 'Hesta', password: email })).rejects.toMatchObject({ code: 'bad_input', field: 'password' });
    expect((await findLink(database(), 'invite', secret)).state).toBe('good');
  });

  test('followed by several at once is accepted once', async () => {
    const { secret } = await invited();
    const outcomes = await Promise.allSettled([1, 2, 3, 4].map((i) => acceptInvitation(nobody(), { secret, name: `Hesta ${i}`, password: `${PASSWORD} ${i}` })));
    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(1);
  });

  test('runs out, and a newer one takes its place', async () => {
    const { email, secret } = await invited();
    await inviteUser(contextOf(admin), { email });
    const secrets = await mailedSecrets(email, 'invite');
    expect(secrets).toHaveLength(2);
    expect((await findLink(database(), 'invite', secret)).state).toBe('expired');
    await expect(acceptInvitation(nobody(), { secret, name: 'Hesta', password: PASSWORD })).rejects.toMatchObject({ code: 'conflict' });
    await asOwner(`update one_time_links set expires_at = now() - interval '1 second' where used_at is null`);
    expect((await findLink(database(), 'invite', secrets[1])).state).toBe('expired');
    await expect(acceptInvitation(nobody(), { secret: secrets[1], name: 'Hesta', password: PASSWORD })).rejects.toMatchObject({ code: 'conflict' });
  });

  test('is unknown when it is made up, meant for another purpose, or of somebody disabled', async () => {
    const { email, secret } = await invited();
    expect((await findLink(database(), 'invite', 'x'.repeat(43))).state).toBe('unknown');
    expect((await findLink(database(), 'reset', secret)).state).toBe('unknown');
    await expect(resetPassword(nobody(), { secret, password: PASSWORD })).rejects.toMatchObject({ code: 'conflict' });
    await disableUser(contextOf(admin), { email });
    expect((await findLink(database(), 'invite', secret)).state).toBe('unknown');
    await expect(acceptInvitation(nobody(), { secret, name: 'Hesta', password: PASSWORD })).rejects.toMatchObject({ code: 'conflict' });
  });

  test('is stored as a hash', async () => {
    const { secret } = await invited();
    const rows = await asOwner('select to_jsonb(l)::text as row from one_time_links l');
    expect(JSON.stringify(rows)).not.toContain(secret);
  });

  test('is sent again only to who has no password', async () => {
    const { email, secret } = await invited();
    await acceptInvitation(nobody(), { secret, name: 'Hesta', password: PASSWORD });
    await expect(inviteUser(contextOf(admin), { email })).rejects.toMatchObject({ code: 'conflict' });
    await expect(inviteUser(contextOf(await createUser()), { email })).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('a password reset', () => {
  async function withPassword(): Promise<string> {
    const { email, secret } = await invited();
    await acceptInvitation(nobody(), { secret, name: 'Hesta', password: PASSWORD });
    return email;
  }

  test('answers the same for every address and mails only who is there', async () => {
    const email = await withPassword();
    const disabled = await withPassword();
    await disableUser(contextOf(admin), { email: disabled });
    const count = async () => (await asOwner('select 1 from mails')).length;
    const before = await count();
    expect(await requestReset(nobody(), { email: 'nobody@oxbarrow.example' })).toEqual({ sent: true });
    expect(await requestReset(nobody(), { email: disabled })).toEqual({ sent: true });
    expect(await count()).toBe(before);
    expect(await requestReset(nobody(), { email })).toEqual({ sent: true });
    expect(await count()).toBe(before + 1);
  });

  test('sets a new password, ends sessions and lifts the slowing', async () => {
    const email = await withPassword();
    const epoch = async () => (await asOwner<{ session_epoch: number }>('select session_epoch from users where email = $1', [email]))[0].session_epoch;
    for (let i = 0; i < 8; i++) await verifyCredentials(database(), email, 'wrong password');
    const before = await epoch();
    await requestReset(nobody(), { email });
    const [secret] = await mailedSecrets(email, 'reset');
    await resetPassword(nobody(), { secret, password: 'another bell rings' });
    expect(await epoch()).toBe(before + 1);
    expect(await verifyCredentials(database(), email, 'another bell rings')).toMatchObject({ state: 'fits' });
    expect((await findLink(database(), 'reset', secret)).state).toBe('used');
  });

  test('only the newest link works', async () => {
    const email = await withPassword();
    await requestReset(nobody(), { email });
    await requestReset(nobody(), { email });
    const [first, second] = await mailedSecrets(email, 'reset');
    await expect(resetPassword(nobody(), { secret: first, password: 'another bell rings' })).rejects.toMatchObject({ code: 'conflict' });
    await resetPassword(nobody(), { secret: second, password: 'another bell rings' });
  });

  test('asked for without end sends a few', async () => {
    const email = await withPassword();
    await Promise.all(Array.from({ length: 12 }, () => requestReset(nobody(), { email })));
    expect((await mailedSecrets(email, 'reset')).length).toBeLessThanOrEqual(5);
  });

  test('is an invitation again for who never chose a password', async () => {
    const { email } = await invited();
    await requestReset(nobody(), { email });
    expect(await mailedSecrets(email, 'invite')).toHaveLength(2);
    expect(await mailedSecrets(email, 'reset')).toHaveLength(0);
  });
});
