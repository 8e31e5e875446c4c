import { randomUUID } from 'node:crypto';
import { expect, test } from 'vitest';
import { database } from '@/db/client';
import { verifyCredentials } from '@/lib/auth/verify-credentials';
import type { Context } from '@/lib/context';
import { createFirstAdminInput } from '@/lib/rules/inputs/create-first-admin';
import { createFirstAdmin } from '@/lib/users/create-first-admin';
import { hasUsers } from '@/lib/users/has-users';
import { asOwner } from '../support/database';

const nobody = (): Context => ({ db: database(), actor: null, origin: 'hand', requestId: randomUUID() });
const person = (name: string) => ({ email: `${name}@oxbarrow.example`, name, password: 'ferrow tarn bell' });

test('of many who set up at once one becomes the admin, and nobody after them', async () => {
  expect(await hasUsers(database())).toBe(false);
  const outcomes = await Promise.allSettled(['odrun', 'tamsel', 'ilvo', 'hesta', 'pell'].map((name) => createFirstAdmin(nobody(), person(name))));
  expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(1);
  for (const outcome of outcomes) if (outcome.status === 'rejected') expect(outcome.reason).toMatchObject({ code: 'conflict' });
  const users = await asOwner<{ id: string; email: string; is_admin: boolean }>('select id, email, is_admin from users');
  expect(users).toEqual([expect.objectContaining({ is_admin: true })]);
  expect(await verifyCredentials(database(), users[0].email, 'ferrow tarn bell')).toMatchObject({ state: 'fits' });
  expect(await asOwner('select act, actor_id from audit_events')).toEqual([{ act: 'create-first-admin', actor_id: users[0].id }]);
  await expect(createFirstAdmin(nobody(), person('later'))).rejects.toMatchObject({ code: 'conflict' });
  expect(await asOwner('select 1 from users')).toHaveLength(1);
});

test.each([
  ['a short password', { password: 'too short' }, 'password'],
  ['the e-mail as password', { password: 'ODRUN@oxbarrow.example' }, 'password'],
  ['no address', { email: 'odrun' }, 'email'],
  ['no name', { name: ' ' }, 'name'],
])('refuses %s', (_what, change, field) => {
  const parsed = createFirstAdminInput.safeParse({ ...person('odrun'), ...change });
  expect(parsed.error?.issues.map((issue) => issue.path.join('.'))).toEqual([field]);
});
