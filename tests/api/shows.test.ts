import { beforeAll, describe, expect, test } from 'vitest';
import { GET, POST } from '@/app/api/v1/shows/route';
import { call, eachCaller, expectProblem, rowsOf } from '../support/api';
import { addMember, createCast, createShowRow, createUser, type Cast } from '../support/cast';
import { asOwner } from '../support/database';

const body = (code: string) => ({ code, title: 'The Bell', linear_unit: 'cm', up_axis: 'y', scheme: 'catmull-clark' });

let cast: Cast;
beforeAll(async () => {
  cast = await createCast();
});

describe('POST /shows', () => {
  eachCaller(
    'making a show',
    POST,
    { admin: 201, lead: 403, td: 403, artist: 403, guest: 403, outsider: 403, nobody: 401 },
    ['shows', 'audit_events', 'users', 'mails'],
    async (caller) => ({ body: { ...body(`by-${caller}`), leads: [`lead-of-${caller}@oxbarrow.example`] }, token: cast.tokenOf(caller) }),
  );

  test('answers the show with what was left to its defaults', async () => {
    const answer = await call(POST, { body: body('tarn'), token: cast.people.admin.token });
    expect(answer.status).toBe(201);
    expect(answer.json).toMatchObject({ ...body('tarn'), boundary: 'edge-and-corner', parts_by: 'group', self_approval: false, frozen: false, archived: false });
  });

  test('a code is taken in any case of letters', async () => {
    await call(POST, { body: body('Ferrow'), token: cast.people.admin.token });
    const before = await rowsOf('shows', 'audit_events');
    expectProblem(await call(POST, { body: body('FERROW'), token: cast.people.admin.token }), 409, 'already_exists', 'code');
    expect(await rowsOf('shows', 'audit_events')).toBe(before);
  });

  test.each([
    ['an unknown unit', { linear_unit: 'km' }, 'linear_unit'],
    ['an unknown axis', { up_axis: 'x' }, 'up_axis'],
    ['an unknown scheme', { scheme: 'butterfly' }, 'scheme'],
    ['a code with a space', { code: 'two words' }, 'code'],
    ['an empty title', { title: '  ' }, 'title'],
    ['a lead that is no address', { leads: ['nobody'] }, 'leads.0'],
  ])('refuses %s and names the field', async (_what, change, field) => {
    const before = await rowsOf('shows');
    expectProblem(await call(POST, { body: { ...body('odd'), ...change }, token: cast.people.admin.token }), 422, 'bad_input', field);
    expect(await rowsOf('shows')).toBe(before);
  });

  test('refuses a field that does not exist', async () => {
    expectProblem(await call(POST, { body: { ...body('odd2'), units: 'cm' }, token: cast.people.admin.token }), 422, 'bad_input');
  });

  test('an Idempotency-Key makes one show of two equal requests, and refuses another request', async () => {
    const token = cast.people.admin.token;
    const send = (title: string) => call(POST, { body: { ...body('once'), title }, token, headers: { 'idempotency-key': 'make-once' } });
    const first = await send('The Bell');
    const second = await send('The Bell');
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.json).toEqual(first.json);
    expect(second.headers.get('idempotent-replayed')).toBe('true');
    expectProblem(await send('Another'), 409, 'conflict');
    expect(await asOwner(`select code from shows where code = 'once'`)).toHaveLength(1);
  });

  test('of two at once with one code, one makes the show', async () => {
    const token = cast.people.admin.token;
    const answers = await Promise.all([1, 2, 3, 4].map(() => call(POST, { body: body('race'), token })));
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409, 409, 409]);
    expect(await asOwner(`select code from shows where lower(code) = 'race'`)).toHaveLength(1);
  });

  test('named leads are members, invited when they are unknown, told when they are not', async () => {
    const known = await createUser();
    await asOwner(`update users set password_hash = 'x' where id = $1`, [known.id]);
    const leads = [known.email, 'new.lead@oxbarrow.example'];
    const answer = await call(POST, { body: { ...body('leads'), leads }, token: cast.people.admin.token });
    expect(answer.status).toBe(201);
    const rows = await asOwner(
      `select u.email, u.name, m.role from members m join users u on u.id = m.user_id join shows s on s.id = m.show_id where s.code = 'leads' order by u.email`,
    );
    expect(rows).toEqual(
      [
        { email: known.email, name: known.name, role: 'lead' },
        { email: 'new.lead@oxbarrow.example', name: 'New Lead', role: 'lead' },
      ].sort((a, b) => (a.email < b.email ? -1 : 1)),
    );
    const mails = await asOwner<{ subject: string; state: string }>(`select to_email, subject, state from mails where to_email = any($1) order by to_email`, [leads]);
    expect(mails.map((mail) => mail.subject).sort()).toEqual(['Invitation to The Bell', 'You are in The Bell']);
    expect(new Set(mails.map((mail) => mail.state))).toEqual(new Set(['local']));
  });

  test('a page of another site cannot write under the session, and JSON has to say that it is JSON', async () => {
    const before = await rowsOf('shows');
    expectProblem(await call(POST, { body: body('csrf'), headers: { origin: 'http://elsewhere.example', 'sec-fetch-site': 'cross-site' } }), 403, 'forbidden');
    expectProblem(await call(POST, { raw: JSON.stringify(body('csrf')), headers: { 'content-type': 'text/plain' }, token: cast.people.admin.token }), 415, 'wrong_media_type');
    expect(await rowsOf('shows')).toBe(before);
  });
});

describe('GET /shows', () => {
  test('nobody gets nothing', async () => {
    expectProblem(await call(GET), 401, 'not_signed_in');
    expectProblem(await call(GET, { token: 'wh_' + 'x'.repeat(43) }), 401, 'not_signed_in');
  });

  test.each(['lead', 'td', 'artist', 'guest'] as const)('a %s gets their own show alone', async (caller) => {
    const answer = await call(GET, { token: cast.tokenOf(caller) });
    expect(answer.status).toBe(200);
    const items = answer.json?.items as { code: string; role: string; parts: unknown }[];
    expect(items.map((item) => [item.code, item.role])).toEqual([[cast.show.code, caller]]);
    expect(items[0].parts === null).toBe(caller === 'guest');
  });

  test('an admin gets every show, an outsider not this one', async () => {
    const codes = async (who: 'admin' | 'outsider') => ((await call(GET, { token: cast.tokenOf(who), query: { limit: '500' } })).json?.items as { code: string }[]).map((item) => item.code);
    expect(await codes('admin')).toContain(cast.show.code);
    expect(await codes('outsider')).not.toContain(cast.show.code);
    const rows = await asOwner<{ code: string }>('select code from shows');
    expect(new Set(await codes('admin'))).toEqual(new Set(rows.map((row) => row.code)));
  });

  test('pages tell every show once', async () => {
    const person = await createUser();
    const made = [];
    for (let i = 0; i < 7; i++) {
      const show = await createShowRow();
      made.push(show.code);
      await addMember(show, person, 'artist');
    }
    const seen: string[] = [];
    let cursor: string | null = null;
    do {
      const answer: Awaited<ReturnType<typeof call>> = await call(GET, { token: person.token, query: { limit: '3', ...(cursor ? { cursor } : {}) } });
      seen.push(...(answer.json?.items as { code: string }[]).map((item) => item.code));
      cursor = answer.json?.next_cursor as string | null;
    } while (cursor);
    expect(seen).toEqual([...made].sort());
  });
});
