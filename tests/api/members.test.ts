import { describe, expect, test } from 'vitest';
import { DELETE, PUT } from '@/app/api/v1/shows/[show]/members/[email]/route';
import { call, eachCaller, expectProblem, rowsOf } from '../support/api';
import { addMember, createCast, createUser, type Cast } from '../support/cast';
import { asOwner } from '../support/database';

const TABLES = ['members', 'users', 'mails', 'one_time_links', 'audit_events', 'audit_items'];

async function roleOf(cast: Cast, email: string): Promise<string | null> {
  const [row] = await asOwner<{ role: string }>(
    `select m.role from members m join users u on u.id = m.user_id where m.show_id = $1 and u.email = $2`,
    [cast.show.id, email],
  );
  return row?.role ?? null;
}

function put(cast: Cast, email: string, body: object, token: string | null = cast.people.lead.token) {
  return call(PUT, { method: 'PUT', params: { show: cast.show.code, email }, body, token });
}

function remove(cast: Cast, email: string, token: string | null = cast.people.lead.token) {
  return call(DELETE, { method: 'DELETE', params: { show: cast.show.code, email }, token });
}

describe('PUT a member', () => {
  eachCaller('inviting', PUT, { admin: 201, lead: 201, td: 403, artist: 403, guest: 404, outsider: 404, nobody: 401 }, TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'PUT', params: { show: cast.show.code, email: `new-${caller}@oxbarrow.example` }, body: { role: 'artist' }, token: cast.tokenOf(caller) };
  });

  eachCaller('changing a role', PUT, { admin: 200, lead: 200, td: 403, artist: 403, guest: 404, outsider: 404, nobody: 401 }, TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'PUT', params: { show: cast.show.code, email: cast.people.td.email }, body: { role: 'lead' }, token: cast.tokenOf(caller) };
  });

  test.each(['td', 'artist', 'guest', 'outsider'] as const)('a %s cannot make themself lead', async (caller) => {
    const cast = await createCast();
    const before = await rowsOf(...TABLES);
    const answer = await put(cast, cast.people[caller].email, { role: 'lead' }, cast.tokenOf(caller));
    expect([403, 404]).toContain(answer.status);
    expect(await rowsOf(...TABLES)).toBe(before);
  });

  test('is the same however often it is sent', async () => {
    const cast = await createCast();
    const email = 'again@oxbarrow.example';
    const first = await put(cast, email, { role: 'guest', shots: ['fer_0020', 'fer_0010'], assets: ['sledge'] });
    expect(first.status).toBe(201);
    expect(first.json).toEqual({ email, name: 'Again', role: 'guest', shots: ['fer_0010', 'fer_0020'], assets: ['sledge'], invited: true });
    const before = await rowsOf(...TABLES);
    const second = await put(cast, email, { role: 'guest', shots: ['fer_0010', 'fer_0020'], assets: ['sledge'] });
    expect(second.status).toBe(200);
    expect(second.json).toEqual(first.json);
    expect(await rowsOf(...TABLES)).toBe(before);
  });

  test('finds a person in any case of letters', async () => {
    const cast = await createCast();
    const answer = await put(cast, cast.people.outsider.email.toUpperCase(), { role: 'td' });
    expect(answer.status).toBe(201);
    expect(await roleOf(cast, cast.people.outsider.email)).toBe('td');
    expect(await asOwner('select 1 from users where lower(email) = $1', [cast.people.outsider.email])).toHaveLength(1);
  });

  test('a guest who becomes an artist is no longer limited', async () => {
    const cast = await createCast();
    await put(cast, cast.people.guest.email, { role: 'guest', shots: ['fer_0010'] });
    const answer = await put(cast, cast.people.guest.email, { role: 'artist' });
    expect(answer.json).toMatchObject({ role: 'artist', shots: [], assets: [] });
  });

  test('writes who changed which role, before and after', async () => {
    const cast = await createCast();
    await put(cast, cast.people.td.email, { role: 'artist' });
    const rows = await asOwner(
      `select e.act, e.subject, e.actor_id, e.origin, i.field, i.before, i.after from audit_events e join audit_items i on i.event_id = e.id where e.show_id = $1`,
      [cast.show.id],
    );
    expect(rows).toEqual([{ act: 'set-member', subject: cast.people.td.email, actor_id: cast.people.lead.id, origin: 'api', field: 'role', before: 'td', after: 'artist' }]);
  });

  test.each([
    ['an unknown role', { role: 'boss' }, 'role'],
    ['limits for who is no guest', { role: 'td', shots: ['fer_0010'] }, 'shots'],
    ['no role', {}, 'role'],
    ['an unknown field', { role: 'td', admin: true }, undefined],
  ])('refuses %s', async (_what, body, field) => {
    const cast = await createCast();
    const before = await rowsOf(...TABLES);
    expectProblem(await put(cast, 'odd@oxbarrow.example', body), 422, 'bad_input', field);
    expect(await rowsOf(...TABLES)).toBe(before);
  });

  test('a body cannot send the call to another show or person', async () => {
    const [mine, other] = [await createCast(), await createCast()];
    const answer = await put(mine, mine.people.td.email, { role: 'artist', show: other.show.code, email: mine.people.artist.email });
    expect(answer.status).toBe(200);
    expect(await roleOf(mine, mine.people.td.email)).toBe('artist');
    expect(await roleOf(other, mine.people.td.email)).toBeNull();
  });

  test('a disabled person cannot be let in', async () => {
    const cast = await createCast();
    const gone = await createUser();
    await asOwner('update users set disabled_at = now() where id = $1', [gone.id]);
    expectProblem(await put(cast, gone.email, { role: 'artist' }), 409, 'conflict', 'email');
    expect(await roleOf(cast, gone.email)).toBeNull();
  });

  test('an archived show keeps its members as they are', async () => {
    const cast = await createCast({ archivedAt: new Date() });
    const before = await rowsOf(...TABLES);
    expectProblem(await put(cast, cast.people.td.email, { role: 'artist' }), 409, 'frozen');
    expectProblem(await remove(cast, cast.people.td.email), 409, 'frozen');
    expect(await rowsOf(...TABLES)).toBe(before);
  });

  test('two leads who demote each other at once leave one lead', async () => {
    for (let round = 0; round < 5; round++) {
      const cast = await createCast();
      const second = await createUser();
      await addMember(cast.show, second, 'lead');
      const answers = await Promise.all([
        put(cast, second.email, { role: 'artist' }, cast.people.lead.token),
        put(cast, cast.people.lead.email, { role: 'artist' }, second.token),
      ]);
      expect(answers.filter((answer) => answer.status === 200)).toHaveLength(1);
      const leads = await asOwner(`select 1 from members where show_id = $1 and role = 'lead'`, [cast.show.id]);
      expect(leads).toHaveLength(1);
    }
  });

  test('one address invited by two at once becomes one person', async () => {
    const cast = await createCast();
    const email = 'twice@oxbarrow.example';
    const answers = await Promise.all([put(cast, email, { role: 'td' }), put(cast, email, { role: 'td' }, cast.people.admin.token)]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([200, 201]);
    expect(await asOwner('select 1 from users where email = $1', [email])).toHaveLength(1);
    expect(await asOwner('select 1 from mails where to_email = $1', [email])).toHaveLength(1);
  });
});

describe('DELETE a member', () => {
  eachCaller('removing', DELETE, { admin: 204, lead: 204, td: 403, artist: 403, guest: 404, outsider: 404, nobody: 401 }, TABLES, async (caller) => {
    const cast = await createCast();
    const leaving = await createUser();
    await addMember(cast.show, leaving, 'artist');
    return { method: 'DELETE', params: { show: cast.show.code, email: leaving.email }, token: cast.tokenOf(caller) };
  });

  test('who is removed gets 404 for the show from then on', async () => {
    const cast = await createCast();
    expect((await remove(cast, cast.people.td.email)).status).toBe(204);
    expect(await roleOf(cast, cast.people.td.email)).toBeNull();
    expectProblem(await put(cast, 'x@oxbarrow.example', { role: 'artist' }, cast.people.td.token), 404, 'not_found');
    expectProblem(await remove(cast, cast.people.td.email), 404, 'not_found', 'email');
  });

  test.each(['lead', 'admin'] as const)('the last lead stays, also when a %s asks', async (caller) => {
    const cast = await createCast();
    const before = await rowsOf(...TABLES);
    expectProblem(await remove(cast, cast.people.lead.email, cast.tokenOf(caller)), 409, 'conflict');
    expectProblem(await put(cast, cast.people.lead.email, { role: 'artist' }, cast.tokenOf(caller)), 409, 'conflict');
    expect(await rowsOf(...TABLES)).toBe(before);
  });
});
