import { createHash } from 'node:crypto';
import { expect, test } from 'vitest';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/export.csv/route';
import { GET as exportShot } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { approveValues } from '@/lib/approvals/approve-values';
import { getComparison } from '@/lib/compare/get-comparison';
import { listOutdated } from '@/lib/locks/list-outdated';
import { decidePartRenames } from '@/lib/parts/decide-part-renames';
import { getPart } from '@/lib/parts/get-part';
import { listPartRenames } from '@/lib/parts/list-part-renames';
import type { RenameDecision } from '@/lib/rules/part-rename';
import { StudioError } from '@/lib/rules/studio-error';
import { setValues } from '@/lib/settings/set-values';
import { call } from '../support/api';
import type { Cast, Person } from '../support/cast';
import { approveBody, bodyNow, createCrateShow, lockBody } from '../support/crate-show';
import { asOwner } from '../support/database';
import { boxPart, putCage, type TestPart } from '../support/put-cage';

const BODY: TestPart = boxPart('body', [0, 0, 0], [2, 3, 4]);
const LID = boxPart('lid', [10, 0, 0], [11, 1, 1]);
const named = (part: TestPart, name: string): TestPart => ({ ...part, name });
const moved = (part: TestPart, by: number): TestPart => ({ ...part, positions: part.positions.map(([x, y, z]) => [x + by, y, z]) });

const bring = (cast: Cast, ...parts: TestPart[]) => putCage(cast.show, cast.people.td, 'crate', parts);
const proposalsOf = async (cast: Cast) => (await listPartRenames(cast.contextOf('artist'), { show: cast.show.code, asset: 'crate' })).items.flatMap((one) => one.proposals);
const decide = (cast: Cast, part: string, becomes: string, decision: RenameDecision, { by = 'td', version = 'v002' }: { by?: Person; version?: string } = {}) =>
  decidePartRenames(cast.contextOf(by), { show: cast.show.code, items: [{ asset: 'crate', version, part, becomes, decision }] });
const rowsNow = (cast: Cast) => asOwner<{ part: string; part_id: string; state: string; mass_kg: number | null; density_kg_m3: number | null }>(`select part, part_id, state, mass_kg, density_kg_m3 from part_current where show_id = $1 order by part`, [cast.show.id]);

async function refusal(promise: Promise<unknown>): Promise<StudioError> {
  const error = await promise.then(() => null, (thrown: unknown) => thrown);
  expect(error).toBeInstanceOf(StudioError);
  return error as StudioError;
}

const shotBytes = async (cast: Cast): Promise<string> => createHash('sha256').update((await call(exportShot, { params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.tokenOf('artist') })).text).digest('hex');

test('the same geometry under another name is proposed, and confirmed keeps identity, setting, approval and lock', async () => {
  const cast = await createCrateShow();
  const before = await bodyNow(cast);
  const valueId = await approveBody(cast);
  const lock = await lockBody(cast, valueId);
  const bytes = await shotBytes(cast);
  await bring(cast, named(BODY, 'hull'), LID);
  expect(await proposalsOf(cast)).toEqual([{ part: 'body', becomes: 'hull', fit: 'place', others: 0 }]);
  expect((await rowsNow(cast)).map((row) => [row.part, row.state])).toEqual([['hull', 'unset'], ['lid', 'unset']]);

  expect(await decide(cast, 'body', 'hull', 'confirmed')).toEqual({ items: [{ asset: 'crate', part: 'hull', decision: 'confirmed' }] });
  const [hull] = await rowsNow(cast);
  // 2 × 3 × 4 m at the 1 kg/m³ that was set on the body.
  expect(hull).toMatchObject({ part: 'hull', part_id: before.partId, state: 'outdated', density_kg_m3: 1 });
  expect(hull.mass_kg).toBeCloseTo(24, 9);
  expect(await shotBytes(cast)).toBe(bytes);
  const [stale] = (await listOutdated(cast.contextOf('artist'), { show: cast.show.code })).items;
  expect(stale).toMatchObject({ lock, part: 'hull', part_id: before.partId, why: 'changed', beyond_tolerance: false });
  const csv = await call(exportCsv, { params: { show: cast.show.code }, query: { state: 'outdated' }, token: cast.tokenOf('artist') });
  expect(csv.text).toMatch(/,part,hull,,,/);
  expect(csv.text).not.toMatch(/,part,body,,,/);
  expect(await proposalsOf(cast)).toEqual([]);
  const acts = await asOwner(`select e.act, e.subject, i.part_id, i.field, i.before, i.after from audit_events e join audit_items i on i.event_id = e.id where e.show_id = $1 and e.act = 'rename-part'`, [cast.show.id]);
  expect(acts).toEqual([{ act: 'rename-part', subject: 'crate/hull', part_id: before.partId, field: 'name', before: 'body', after: 'hull' }]);
});

test('versions, comparison and the old address know the part by either name', async () => {
  const cast = await createCrateShow();
  await approveBody(cast);
  await bring(cast, named(BODY, 'hull'), LID);
  await decide(cast, 'body', 'hull', 'confirmed');
  const artist = cast.contextOf('artist');
  for (const part of ['hull', 'body']) {
    const detail = await getPart(artist, { show: cast.show.code, asset: 'crate', part });
    expect(detail.row.part).toBe('hull');
    expect(detail.versions.map((version) => [version.version, version.present])).toEqual([['v002', true], ['v001', true]]);
    const compared = await getComparison(artist, { show: cast.show.code, asset: 'crate', part, a: 'v001', b: 'current' });
    expect([compared.before.numbers?.mass_kg, compared.after.numbers?.mass_kg]).toEqual([24, 24].map((kg) => expect.closeTo(kg, 9) as number));
  }
  const approved = await getComparison(artist, { show: cast.show.code, asset: 'crate', part: 'hull' });
  expect(approved.before.ref).toBe('approved');
});

test('refused stays two parts and is not proposed again, in later versions neither', async () => {
  const cast = await createCrateShow();
  await bring(cast, named(BODY, 'hull'), LID);
  await decide(cast, 'body', 'hull', 'refused');
  expect(await proposalsOf(cast)).toEqual([]);
  await bring(cast, named(BODY, 'hull'), moved(LID, 1));
  expect(await proposalsOf(cast)).toEqual([]);
  expect((await refusal(decide(cast, 'body', 'hull', 'refused', { version: 'v003' }))).code).toBe('conflict');
  expect((await rowsNow(cast)).map((row) => [row.part, row.state])).toEqual([['hull', 'unset'], ['lid', 'unset']]);
});

test('a pair that was kept apart is confirmed only by who saw that', async () => {
  const cast = await createCrateShow();
  await bring(cast, named(BODY, 'hull'), LID);
  await decide(cast, 'body', 'hull', 'refused', { by: 'lead' });
  const before = await rowsNow(cast);
  expect((await refusal(decide(cast, 'body', 'hull', 'confirmed'))).code).toBe('conflict');
  expect(await rowsNow(cast)).toEqual(before);
  const [{ kept_apart: apart }] = (await listPartRenames(cast.contextOf('td'), { show: cast.show.code })).items;
  expect(apart).toEqual([{ part: 'body', becomes: 'hull' }]);
  await decidePartRenames(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', version: 'v002', part: 'body', becomes: 'hull', decision: 'confirmed', kept_apart: true }] });
  expect((await rowsNow(cast)).map((row) => [row.part, row.state])).toEqual([['hull', 'measured'], ['lid', 'unset']]);
});

test('of mirrored and equal parts those in one place are matched; moved ones by shape, with the others said', async () => {
  const cast = await createCrateShow();
  const boulder = (x: number, name: string) => boxPart(name, [x, 0, 20], [x + 1, 2, 21]);
  await bring(cast, BODY, boulder(0, 'rock1'), boulder(5, 'rock2'), boulder(9, 'rock3'));
  await bring(cast, BODY, boulder(5, 'stoneB'), boulder(0, 'stoneA'), moved(boulder(9, 'stoneC'), 2));
  expect(await proposalsOf(cast)).toEqual([
    { part: 'rock1', becomes: 'stoneA', fit: 'place', others: 0 },
    { part: 'rock2', becomes: 'stoneB', fit: 'place', others: 0 },
    { part: 'rock3', becomes: 'stoneC', fit: 'shape', others: 0 },
  ]);
});

test('other geometry is not proposed, and can be told by hand', async () => {
  const cast = await createCrateShow();
  await bring(cast, boxPart('hull', [0, 0, 0], [2, 3, 5]), LID);
  expect(await proposalsOf(cast)).toEqual([]);
  const { items } = await listPartRenames(cast.contextOf('td'), { show: cast.show.code });
  expect(items).toMatchObject([{ asset: 'crate', version: 'v002', absent: [{ part: 'body', last_version: 'v001', has_setting: true }], arrived: [{ part: 'hull', first_version: 'v002', has_setting: false }] }]);
  await decide(cast, 'body', 'hull', 'confirmed');
  const [hull] = await rowsNow(cast);
  expect(hull).toMatchObject({ part: 'hull', state: 'measured' });
  expect(hull.mass_kg).toBeCloseTo(30, 9);
  expect(await asOwner('select fit, decision from part_renames r join assets a on a.id = r.asset_id where a.show_id = $1', [cast.show.id])).toEqual([{ fit: 'hand', decision: 'confirmed' }]);
});

test('a newer version meanwhile, a second person, and parts that were in one version are refused, and nothing changes', async () => {
  const cast = await createCrateShow();
  await bring(cast, named(BODY, 'hull'), LID);
  await bring(cast, named(BODY, 'hull'), moved(LID, 1));
  const before = await rowsNow(cast);
  expect((await refusal(decide(cast, 'body', 'hull', 'confirmed'))).code).toBe('conflict');
  expect((await refusal(decide(cast, 'body', 'lid', 'confirmed', { version: 'v003' }))).code).toMatch(/conflict|bad_input/);
  expect((await refusal(decide(cast, 'nothing', 'hull', 'confirmed', { version: 'v003' }))).code).toBe('conflict');
  expect(await rowsNow(cast)).toEqual(before);
  const both = await Promise.allSettled([decide(cast, 'body', 'hull', 'confirmed', { version: 'v003' }), decide(cast, 'body', 'hull', 'refused', { by: 'lead', version: 'v003' })]);
  // Whoever comes second saw neither the confirmation nor the refusal, and is told to look again.
  const codes = both.map((one) => (one.status === 'fulfilled' ? 'done' : (one.reason as StudioError).code));
  expect(codes.toSorted()).toEqual(['conflict', 'done']);
  expect((await rowsNow(cast))[0].part).toBe('hull');
  const again = await Promise.allSettled([1, 2].map(() => decide(cast, 'body', 'hull', 'confirmed', { version: 'v003' })));
  expect(again.map((one) => one.status)).toEqual(['rejected', 'rejected']);
});

test('a new part with an approval or a lock of its own keeps it; a mere setting gives way, and its row’s revision goes on', async () => {
  const cast = await createCrateShow();
  await bring(cast, named(BODY, 'hull'), LID);
  const lead = cast.contextOf('lead');
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'hull', revision: 1, density_kg_m3: 7 }] });
  const [seen] = await asOwner<{ revision: number; part_id: string }>(`select revision, part_id from part_current where show_id = $1 and part = 'hull'`, [cast.show.id]);
  await decide(cast, 'body', 'hull', 'confirmed', { by: 'lead' });
  const [now] = await asOwner<{ revision: number; density_kg_m3: number; part_id: string }>(`select revision, density_kg_m3, part_id from part_current where show_id = $1 and part = 'hull'`, [cast.show.id]);
  expect(now.revision).toBeGreaterThan(seen.revision);
  expect(now.density_kg_m3).toBe(1);
  const stale = setValues(lead, { show: cast.show.code, items: [{ asset: 'crate', part: 'hull', revision: seen.revision, density_kg_m3: 9 }] });
  expect((await refusal(stale)).code).toMatch(/precondition_failed|conflict/);
  // The lead renamed it, so the lead set an input of it; nobody approves what they set.
  const { value_sha256 } = (await asOwner<{ value_sha256: string }>(`select value_sha256 from part_current where part_id = $1`, [now.part_id]))[0];
  await expect(approveValues(lead, { show: cast.show.code, items: [{ asset: 'crate', part: 'hull', value_sha256 }], carry_over: false })).rejects.toThrow();
  await approveValues(cast.contextOf('admin'), { show: cast.show.code, items: [{ asset: 'crate', part: 'hull', value_sha256 }], carry_over: false });

  await bring(cast, named(BODY, 'keel'), LID);
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'keel', revision: 1, density_kg_m3: 3 }] });
  const keel = (await asOwner<{ value_sha256: string }>(`select value_sha256 from part_current where show_id = $1 and part = 'keel'`, [cast.show.id]))[0];
  await approveValues(lead, { show: cast.show.code, items: [{ asset: 'crate', part: 'keel', value_sha256: keel.value_sha256 }], carry_over: false });
  const held = await refusal(decide(cast, 'hull', 'keel', 'confirmed', { version: 'v003' }));
  expect([held.code, held.message]).toEqual(['conflict', expect.stringMatching(/approved/)]);
});

test('a later version under the old name is the same part again; one with both names has two', async () => {
  const cast = await createCrateShow();
  const { partId } = await bodyNow(cast);
  await bring(cast, named(BODY, 'hull'), LID);
  await decide(cast, 'body', 'hull', 'confirmed');
  await bring(cast, BODY, LID);
  expect((await rowsNow(cast)).map((row) => [row.part, row.part_id === partId])).toEqual([['body', true], ['lid', false]]);
  await bring(cast, named(BODY, 'hull'), LID);
  expect((await rowsNow(cast)).map((row) => [row.part, row.part_id === partId])).toEqual([['hull', true], ['lid', false]]);
  await bring(cast, named(BODY, 'hull'), moved(BODY, 20), LID);
  const three = await rowsNow(cast);
  expect(three.map((row) => [row.part, row.part_id === partId, row.state])).toEqual([['body', false, 'unset'], ['hull', true, 'measured'], ['lid', false, 'unset']]);
  const names = await asOwner<{ name: string }>(`select name from parts p join assets a on a.id = p.asset_id where a.show_id = $1 order by name`, [cast.show.id]);
  expect(names.map((row) => row.name)).toEqual(['body', 'hull', 'lid']);
});

test('two renames after each other keep one identity', async () => {
  const cast = await createCrateShow();
  const { partId } = await bodyNow(cast);
  await bring(cast, named(BODY, 'hull'), LID);
  await decide(cast, 'body', 'hull', 'confirmed');
  await bring(cast, named(moved(BODY, 3), 'keel'), LID);
  expect(await proposalsOf(cast)).toEqual([{ part: 'hull', becomes: 'keel', fit: 'shape', others: 0 }]);
  await decide(cast, 'hull', 'keel', 'confirmed', { version: 'v003' });
  expect((await rowsNow(cast)).find((row) => row.part === 'keel')?.part_id).toBe(partId);
  const detail = await getPart(cast.contextOf('td'), { show: cast.show.code, asset: 'crate', part: 'body' });
  expect(detail.versions.map((version) => version.present)).toEqual([true, true, true]);
});
