import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import { GET } from '@/app/api/v1/shows/[show]/history.csv/route';
import { listEvents } from '@/lib/history/list-events';
import { recordEvent } from '@/lib/history/record-event';
import { unlockValues } from '@/lib/locks/unlock-values';
import { database } from '@/db/client';
import { listEventsInput } from '@/lib/rules/inputs/list-events';
import { setValues } from '@/lib/settings/set-values';
import { call, eachCaller, expectProblem } from '../support/api';
import type { Cast } from '../support/cast';
import { approveBody, createCrateShow, lockBody, putCrate, setDensity } from '../support/crate-show';
import { asOwner } from '../support/database';

eachCaller('history.csv', GET, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['audit_events', 'audit_items', 'receipts'], async (caller) => {
  const cast = await createCrateShow();
  return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
});

type Row = Record<string, string>;
const csv = async (cast: Cast, query: Record<string, string> = {}): Promise<Row[]> => {
  const answer = await call(GET, { params: { show: cast.show.code }, query, token: cast.people.artist.token });
  expect(answer.status, answer.text).toBe(200);
  return Papa.parse<Row>(answer.text, { header: true, skipEmptyLines: true }).data;
};
const list = (cast: Cast, query: Record<string, string> = {}) => listEvents(cast.contextOf('artist'), listEventsInput.parse({ show: cast.show.code, ...query }));

/** A crate whose body is set, approved, locked in two shots, overridden in one, and unlocked again in the other. */
async function livedThrough(): Promise<{ cast: Cast; valueId: string }> {
  const cast = await createCrateShow();
  const valueId = await approveBody(cast);
  const lock = await lockBody(cast, valueId, 'fer_0010');
  await lockBody(cast, valueId, 'fer_0020');
  await setValues(cast.contextOf('artist'), { show: cast.show.code, items: [{ asset: 'crate', part: 'body', revision: 3, target_mass_kg: 5, shot: 'fer_0020', reason: 'a light one' }] });
  await unlockValues(cast.contextOf('lead'), { show: cast.show.code, shot: 'fer_0010', items: [{ lock }], reason: 'cut, from "fer"' });
  return { cast, valueId };
}

describe('the history', () => {
  test('of a shot holds what was put into it, locked, overridden and unlocked there, and nothing of another', async () => {
    const { cast } = await livedThrough();
    const first = (await list(cast, { shot: 'FER_0010' })).items;
    expect(first.map((event) => event.act)).toEqual(['unlock-values', 'lock-values', 'put-shots']);
    expect(first.flatMap((event) => event.items.map((item) => item.shot))).toEqual(first.flatMap((event) => event.items.map(() => 'fer_0010')));
    expect((await list(cast, { shot: 'fer_0020' })).items.map((event) => event.act)).toEqual(['draft-override', 'lock-values', 'put-shots']);
    expect((await list(cast, { shot: 'fer_0030' })).items).toEqual([]);
  });

  test('of a part holds its acts and its asset’s versions; a piece of a name finds more', async () => {
    const { cast } = await livedThrough();
    await putCrate(cast, 3);
    await database().transaction((tx) => recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'import-version', subject: 'crate', items: [{ field: 'version', before: 'v001', after: 'v002' }] }));
    const acts = (await list(cast, { asset: 'crate', part: 'body' })).items.map((event) => event.act);
    expect(acts).toEqual(['import-version', 'unlock-values', 'draft-override', 'lock-values', 'lock-values', 'approve-values', 'set-values']);
    expect((await list(cast, { asset: 'crate', part: 'bod' })).items.map((event) => event.act)).toEqual(['import-version']);
    expect((await list(cast, { part: 'bod' })).items).toHaveLength(6);
  });

  test('says what the ids of approved values stand for', async () => {
    const { cast, valueId } = await livedThrough();
    const [approval] = (await list(cast, { act: 'approve-values' })).items;
    expect(approval.items).toMatchObject([{ part: 'crate/body', field: 'approval', before: null, after: valueId, before_words: null, after_words: '24.00 kg (v001)' }]);
    const [unlock] = (await list(cast, { act: 'unlock-values' })).items;
    expect(unlock).toMatchObject({ reason: 'cut, from "fer"', items: [{ field: 'lock fer_0010', before_words: '24.00 kg (v001)', after: null }] });
  });

  test('is narrowed by days of UTC, the last one included', async () => {
    const { cast } = await livedThrough();
    const [{ day }] = await asOwner<{ day: string }>(`select to_char(now() at time zone 'utc', 'YYYY-MM-DD') as day`);
    const all = (await list(cast)).items.length;
    expect((await list(cast, { from: day, to: day })).items).toHaveLength(all);
    expect((await list(cast, { to: '2020-01-01' })).items).toEqual([]);
    expect((await list(cast, { from: '2120-01-01' })).items).toEqual([]);
    expectProblem(await call(GET, { params: { show: cast.show.code }, query: { from: '1 March' }, token: cast.people.td.token }), 422, 'bad_input', 'from');
  });
});

describe('the CSV', () => {
  test('has who, what, before, after, from where and when, of what the filters let through', async () => {
    const { cast, valueId } = await livedThrough();
    const answer = await call(GET, { params: { show: cast.show.code }, query: { act: 'unlock-values' }, token: cast.people.artist.token });
    expect(answer.text.split('\r\n')[0]).toBe('event,at_utc,person,email,act,origin,subject,reason,asset,part,shot,field,before,after,before_value,after_value');
    expect(answer.text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    expect(answer.headers.get('content-disposition')).toBe(`attachment; filename="${cast.show.code}_history.csv"`);
    const [row, ...more] = await csv(cast, { act: 'unlock-values' });
    expect(more).toEqual([]);
    const { lead } = cast.people;
    expect(row).toMatchObject({ person: lead.name, email: lead.email, act: 'unlock-values', origin: 'api', subject: 'fer_0010', reason: 'cut, from "fer"', asset: 'crate', part: 'body', shot: 'fer_0010', field: 'lock fer_0010', before: valueId, after: '', before_value: '24.00 kg (v001)', after_value: '' });
    expect(row.at_utc).toMatch(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/);
  });

  test('holds the events of the list in its order, one record a field', async () => {
    const { cast } = await livedThrough();
    await setDensity(cast, 3);
    const rows = await csv(cast);
    const events = (await list(cast)).items;
    expect([...new Set(rows.map((row) => Number(row.event)))]).toEqual(events.map((event) => event.id));
    expect(rows).toHaveLength(events.reduce((sum, event) => sum + Math.max(1, event.item_count), 0));
    expect((await csv(cast, { shot: 'fer_0010' })).map((row) => row.shot)).toEqual(['fer_0010', 'fer_0010', 'fer_0010', 'fer_0010']);
  });

  test('goes on over many pages, an act of many fields among them, without losing or doubling one', async () => {
    const cast = await createCrateShow();
    const items = Array.from({ length: 2345 }, (_, i) => ({ field: `field_${i}`, before: null, after: String(i) }));
    await database().transaction((tx) => recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'many', subject: 'crate', items }));
    await database().transaction((tx) => recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'none', subject: 'crate' }));
    const rows = await csv(cast);
    expect(rows[0]).toMatchObject({ act: 'none', field: '' });
    expect(rows.filter((row) => row.act === 'many').map((row) => row.field)).toEqual(items.map((item) => item.field));
    expect(new Set(rows.map((row) => `${row.event} ${row.field} ${row.part} ${row.after}`)).size).toBe(rows.length);
  });

  test('guards text for a spreadsheet only when asked', async () => {
    const cast = await createCrateShow();
    await database().transaction((tx) => recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'sum', subject: '=1+1', reason: '@x' }));
    expect((await csv(cast, { act: 'sum', guard: '1' }))[0]).toMatchObject({ subject: "'=1+1", reason: "'@x" });
    expect((await csv(cast, { act: 'sum' }))[0]).toMatchObject({ subject: '=1+1', reason: '@x' });
  });
});
