import { describe, expect, test } from 'vitest';
import { GET, POST } from '@/app/api/v1/shows/[show]/told/route';
import { listTold } from '@/lib/notices/list-told';
import { getMailChoice } from '@/lib/users/get-mail-choice';
import { setMailChoice } from '@/lib/users/set-mail-choice';
import { call, eachCaller, expectProblem, type StatusOfCaller } from '../support/api';
import { createCast, type Cast, type Person } from '../support/cast';
import { createCrateShow } from '../support/crate-show';
import { asOwner } from '../support/database';

const MEMBERS: StatusOfCaller = { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 };
const TABLES = ['people_told', 'audit_events'];

const PLACES: Record<string, Record<string, string>> = { 'a show': {}, 'a shot': { shot: 'fer_0010' }, 'an asset': { asset: 'crate' } };

for (const [place, input] of Object.entries(PLACES)) {
  eachCaller(`ask to be told of ${place}`, POST, MEMBERS, TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, body: { ...input, told: true }, token: cast.tokenOf(caller) };
  });

  eachCaller(`see who is told of ${place}`, GET, MEMBERS, TABLES, async (caller) => {
    const cast = await createCrateShow();
    return { params: { show: cast.show.code }, query: input, token: cast.tokenOf(caller) };
  });
}

const set = (cast: Cast, who: Person, body: object) => call(POST, { params: { show: cast.show.code }, body, token: cast.people[who].token });
const get = async (cast: Cast, who: Person, query: Record<string, string> = {}) => (await call(GET, { params: { show: cast.show.code }, query, token: cast.people[who].token })).json;
const names = (cast: Cast, ...who: Person[]) => who.map((one) => ({ name: cast.people[one].name, email: cast.people[one].email }));

describe('people told', () => {
  test('of a shot are those who asked for it and those who asked for the whole show', async () => {
    const cast = await createCrateShow();
    await set(cast, 'artist', { shot: 'FER_0010', told: true });
    await set(cast, 'artist', { shot: 'fer_0010', told: true });
    await set(cast, 'td', { told: true });
    await set(cast, 'lead', { asset: 'crate', told: true });
    expect(await get(cast, 'artist', { shot: 'fer_0010' })).toEqual({ told: true, told_of_show: false, people: names(cast, 'artist', 'td') });
    expect(await get(cast, 'td', { shot: 'fer_0010' })).toMatchObject({ told: false, told_of_show: true });
    expect(await get(cast, 'lead', { shot: 'fer_0020' })).toEqual({ told: false, told_of_show: false, people: names(cast, 'td') });
    expect(await get(cast, 'lead', { asset: 'crate' })).toMatchObject({ told: true, people: names(cast, 'lead', 'td') });
    expect(await get(cast, 'td')).toEqual({ told: true, told_of_show: true, people: names(cast, 'td') });
  });

  test('no more: taken back, once as twice, and only one’s own; the history has each change once', async () => {
    const cast = await createCrateShow();
    for (const who of ['artist', 'td'] as const) await set(cast, who, { shot: 'fer_0010', told: true });
    for (let i = 0; i < 2; i++) expect((await set(cast, 'artist', { shot: 'fer_0010', told: false })).json).toEqual({ told: false });
    expect(await get(cast, 'artist', { shot: 'fer_0010' })).toMatchObject({ told: false, people: names(cast, 'td') });
    const events = await asOwner('select subject, items.before, items.after from audit_events e join audit_items items on items.event_id = e.id where e.show_id = $1 and act = $2 and actor_id = $3 order by e.id', [cast.show.id, 'set-told', cast.people.artist.id]);
    expect(events).toEqual([{ subject: 'fer_0010', before: 'false', after: 'true' }, { subject: 'fer_0010', before: 'true', after: 'false' }]);
  });

  test('those who left are not among them', async () => {
    const cast = await createCrateShow();
    await set(cast, 'artist', { told: true });
    await asOwner('delete from members where user_id = $1', [cast.people.artist.id]);
    expect(await get(cast, 'td')).toMatchObject({ people: [] });
  });

  test('what is not there is not found, and shot and asset together are refused', async () => {
    const cast = await createCrateShow();
    expectProblem(await set(cast, 'td', { shot: 'fer_9999', told: true }), 404, 'not_found');
    expectProblem(await set(cast, 'td', { asset: 'crates', told: true }), 404, 'not_found', 'asset');
    expectProblem(await set(cast, 'td', { asset: 'crate', shot: 'fer_0010', told: true }), 422, 'bad_input', 'asset');
    expectProblem(await set(cast, 'td', { shot: 'fer_0010' }), 422, 'bad_input', 'told');
  });

  test('one’s own list names every place in the shows that one is in', async () => {
    const cast = await createCrateShow();
    for (const place of [{}, { shot: 'fer_0020' }, { asset: 'crate' }]) await set(cast, 'artist', { ...place, told: true });
    const of = { show: cast.show.code, title: cast.show.title };
    expect(await listTold(cast.contextOf('artist'))).toEqual([{ ...of, shot: null, asset: null }, { ...of, shot: null, asset: 'crate' }, { ...of, shot: 'fer_0020', asset: null }]);
    expect(await listTold(cast.contextOf('td'))).toEqual([]);
    await asOwner(`update members set role = 'guest' where user_id = $1`, [cast.people.artist.id]);
    expect(await listTold(cast.contextOf('artist'))).toEqual([]);
  });
});

test('everybody chooses for themselves how they are told; the history has it once', async () => {
  const cast = await createCast();
  expect(await getMailChoice(cast.contextOf('guest'))).toBe('at_once');
  for (let i = 0; i < 2; i++) expect(await setMailChoice(cast.contextOf('guest'), { choice: 'daily' })).toEqual({ choice: 'daily' });
  expect(await getMailChoice(cast.contextOf('guest'))).toBe('daily');
  expect(await getMailChoice(cast.contextOf('artist'))).toBe('at_once');
  expect(await asOwner(`select act from audit_events where actor_id = $1`, [cast.people.guest.id])).toEqual([{ act: 'set-mail-choice' }]);
  await expect(setMailChoice({ ...cast.contextOf('guest'), actor: null }, { choice: 'none' })).rejects.toMatchObject({ code: 'not_signed_in' });
});
