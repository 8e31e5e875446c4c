import { expect, test } from 'vitest';
import { brokenObj, cubeObj, cubesObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, type SentFile } from '../support/imports';

interface VersionRow {
  asset: string;
  label: string;
  record_id: string;
}

const versionsOf = (cast: Cast) =>
  asOwner<VersionRow>(
    `select a.code as asset, v.label, v.record_id from asset_versions v join assets a on a.id = v.asset_id where a.show_id = $1 order by a.code, v.number, v.take`,
    [cast.show.id],
  );
const labelsOf = async (cast: Cast) => (await versionsOf(cast)).map((row) => `${row.asset} ${row.label}`);
const currentOf = (cast: Cast) => asOwner<{ asset: string; part: string; version: string }>(`select asset, part, version from part_current where show_id = $1 order by asset, part`, [cast.show.id]);

/** Polyhedral, so that these tests say nothing about the engine's patches. */
const bring = (cast: Cast, files: Record<string, string | SentFile>, options = {}) => importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral', ...options });

test('a number in the name makes the version, and the highest is the current one whatever ends last', async () => {
  const cast = await createCast();
  await bring(cast, { 'creatures/ox_v013.obj': cubeObj({ size: 3 }) });
  const later = await bring(cast, { 'creatures/ox_v012.obj': cubeObj({ size: 2 }) });
  expect(later.state).toBe('done');
  expect(later.files[0]).toMatchObject({ state: 'done', asset: 'ox', version: 'v012', parts: 1, problems: 0, error: null, remarks: ['not_current'] });
  expect(await labelsOf(cast)).toEqual(['ox v012', 'ox v013']);
  expect(await currentOf(cast)).toEqual([{ asset: 'ox', part: 'body', version: 'v013' }]);
  expect(await asOwner(`select category from assets where code = 'ox' and show_id = $1`, [cast.show.id])).toEqual([{ category: 'creature' }]);
});

test('the same bytes and options change nothing', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v012.obj': cubeObj() });
  const revision = () => asOwner<{ revision: string }>('select revision from shows where id = $1', [cast.show.id]);
  const before = await revision();
  const again = await bring(cast, { 'ox_v012.obj': cubeObj() });
  expect(again.files[0]).toMatchObject({ state: 'done', version: 'v012', remarks: ['unchanged'] });
  const unnumbered = await bring(cast, { 'ox.obj': cubeObj() });
  expect(unnumbered.files[0]).toMatchObject({ version: 'v012', remarks: ['unchanged'] });
  expect(await labelsOf(cast)).toEqual(['ox v012']);
  expect(await revision()).toEqual(before);
});

test('other bytes under a number that exists become its next take, and the bytes before stay', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v012.obj': cubeObj({ size: 2 }) });
  const second = await bring(cast, { 'ox_v012.obj': cubeObj({ size: 3 }) });
  expect(second.files[0]).toMatchObject({ version: 'v012-2', remarks: ['next_take'] });
  const third = await bring(cast, { 'ox_v012.obj': cubeObj({ size: 2 }) });
  expect(third.files[0]).toMatchObject({ version: 'v012-3', remarks: ['next_take'] });
  const rows = await versionsOf(cast);
  expect(rows.map((row) => row.label)).toEqual(['v012', 'v012-2', 'v012-3']);
  // Equal bytes are measured once: the first and the third take share a record.
  expect(rows[2].record_id).toBe(rows[0].record_id);
  expect(rows[1].record_id).not.toBe(rows[0].record_id);
});

test('other options are another measurement', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v001.obj': cubesObj(['a', 'b']) });
  const whole = await bring(cast, { 'ox_v001.obj': cubesObj(['a', 'b']) }, { parts_by: 'whole' });
  expect(whole.files[0]).toMatchObject({ version: 'v001-2', parts: 1 });
});

test('no number in the name is the highest plus one', async () => {
  const cast = await createCast();
  const first = await bring(cast, { 'bell.obj': cubeObj() });
  expect(first.files[0]).toMatchObject({ version: 'v001', remarks: ['no_number'] });
  await bring(cast, { 'bell_v007.obj': cubeObj({ size: 3 }) });
  const next = await bring(cast, { 'bell.obj': cubeObj({ size: 4 }) });
  expect(next.files[0]).toMatchObject({ version: 'v008', remarks: ['no_number'] });
});

test('a gap is said', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v001.obj': cubeObj() });
  const gap = await bring(cast, { 'ox_v004.obj': cubeObj({ size: 3 }) });
  expect(gap.files[0]).toMatchObject({ version: 'v004', remarks: ['gap'] });
});

test('what the sender says wins over the name', async () => {
  const cast = await createCast();
  const said = await bring(cast, { 'export/final.obj': { text: cubeObj(), asset: 'heron', version: 'v021', outside_id: 'A-77', category: 'creature' } });
  expect(said.files[0]).toMatchObject({ asset: 'heron', version: 'v021' });
  expect(await asOwner('select code, category, outside_id from assets where show_id = $1', [cast.show.id])).toEqual([{ code: 'heron', category: 'creature', outside_id: 'A-77' }]);
});

test('one file name in two folders is two assets', async () => {
  const cast = await createCast();
  const both = await bring(cast, { 'props/hook.obj': cubeObj(), 'costumes/hook.obj': cubeObj({ size: 3 }) });
  expect(both.files.map((file) => file.asset)).toEqual(['costumes_hook', 'props_hook']);
  expect(both.files.every((file) => file.remarks.includes('qualified'))).toBe(true);
});

test('two files of one number in one batch become two takes in the order of their names', async () => {
  const cast = await createCast();
  const both = await bring(cast, { 'ox_v002.obj': cubeObj({ size: 3 }), 'ox-v2.obj': cubeObj({ size: 2 }) });
  expect(both.files.map((file) => [file.name, file.version])).toEqual([['ox-v2.obj', 'v002'], ['ox_v002.obj', 'v002-2']]);
});

test('a file that cannot be read makes no version, says where, and stops no other', async () => {
  const cast = await createCast();
  await bring(cast, { 'bridge_v002.obj': cubeObj() });
  const mixed = await bring(cast, { 'bridge_v003.obj': brokenObj, 'notes.txt': 'hello', 'sledge.obj': cubeObj() });
  expect(mixed.state).toBe('done');
  const byName = new Map(mixed.files.map((file) => [file.name, file]));
  expect(byName.get('bridge_v003.obj')).toMatchObject({ state: 'failed', version: null, error: { line: 10, column: 11 } });
  expect(byName.get('notes.txt')).toMatchObject({ state: 'failed', error: { code: 'unknown_format' } });
  expect(byName.get('notes.txt')?.error?.message).toContain('.obj');
  expect(byName.get('sledge.obj')).toMatchObject({ state: 'done' });
  expect(await labelsOf(cast)).toEqual(['bridge v002', 'sledge v001']);
  expect((await currentOf(cast)).map((row) => `${row.asset} ${row.version}`)).toEqual(['bridge v002', 'sledge v001']);
});

test('a version with problems is a version, and its parts are blocked', async () => {
  const cast = await createCast();
  const turned = cubeObj().replace(/^f (\d+) (\d+) (\d+) (\d+)$/m, 'f $4 $3 $2 $1');
  const answer = await bring(cast, { 'rat_v002.obj': turned });
  expect(answer.files[0]).toMatchObject({ state: 'done', version: 'v002', parts: 1 });
  expect(answer.files[0].problems).toBeGreaterThan(0);
  expect(await asOwner('select state from part_current where show_id = $1', [cast.show.id])).toEqual([{ state: 'blocked' }]);
});

test('parts that a version no longer has leave the table and keep their identity', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v001.obj': cubesObj(['head', 'tail']) });
  const ids = () => asOwner<{ name: string; id: string }>(`select p.name, p.id from parts p join assets a on a.id = p.asset_id where a.show_id = $1 order by p.name`, [cast.show.id]);
  const before = await ids();
  await bring(cast, { 'ox_v002.obj': cubesObj(['head']) });
  expect((await currentOf(cast)).map((row) => row.part)).toEqual(['head']);
  await bring(cast, { 'ox_v003.obj': cubesObj(['head', 'tail'], 3) });
  expect((await currentOf(cast)).map((row) => row.part)).toEqual(['head', 'tail']);
  expect(await ids()).toEqual(before);
});

test('an asset 100 times too large or small is shouted about', async () => {
  const cast = await createCast();
  const answer = await bring(cast, { 'giant.obj': cubeObj({ size: 30_000 }), 'fine.obj': cubeObj({ size: 200 }), 'tiny.obj': cubeObj({ size: 0.1 }) });
  expect(answer.files.map((file) => [file.name, file.remarks.filter((remark) => remark.startsWith('unit'))])).toEqual([
    ['fine.obj', []],
    ['giant.obj', ['unit_too_large']],
    ['tiny.obj', ['unit_too_small']],
  ]);
  expect(answer.files[1].size_m).toEqual([300, 300, 300]);
});

test('every version has its act in the history, and a show is frozen by its first import', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v001.obj': cubeObj() });
  await bring(cast, { 'ox_v002.obj': cubeObj({ size: 3 }) });
  const acts = await asOwner(`select e.act, e.origin, e.subject, i.before, i.after from audit_events e join audit_items i on i.event_id = e.id where e.show_id = $1 and act = 'import-version' order by e.id`, [cast.show.id]);
  expect(acts).toEqual([
    { act: 'import-version', origin: 'import', subject: 'ox', before: null, after: 'v001' },
    { act: 'import-version', origin: 'import', subject: 'ox', before: 'v001', after: 'v002' },
  ]);
  const [show] = await asOwner<{ frozen_at: Date | null }>('select frozen_at from shows where id = $1', [cast.show.id]);
  expect(show.frozen_at).not.toBeNull();
});

test('a version that is unlike the one before by the ratio of two units is doubted, one that merely grew is not', async () => {
  const cast = await createCast();
  await bring(cast, { 'ox_v001.obj': cubeObj({ size: 200 }) });
  const remarksOf = async (name: string, size: number) => (await bring(cast, { [name]: cubeObj({ size }) })).files[0].remarks;
  expect(await remarksOf('ox_v002.obj', 300)).toEqual([]);
  expect(await remarksOf('ox_v003.obj', 3)).toEqual(['unit_unlike_before']);
  expect(await remarksOf('ox_v004.obj', 3 * 2.54)).toEqual(['unit_unlike_before']);
});

test('an asset far from what the show’s assets measure is doubted once there are some', async () => {
  const cast = await createCast();
  await bring(cast, Object.fromEntries(['a', 'b', 'c', 'd', 'e'].map((name, i) => [`${name}.obj`, cubeObj({ size: 100 + i })])));
  const { files } = await bring(cast, { 'far.obj': cubeObj({ size: 8_000 }), 'near.obj': cubeObj({ size: 900 }) });
  expect(files.map((file) => [file.name, file.remarks.filter((remark) => remark.startsWith('unit'))])).toEqual([['far.obj', ['unit_unlike_show']], ['near.obj', []]]);
});
