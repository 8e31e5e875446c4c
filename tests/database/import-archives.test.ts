import { zipSync } from 'three/examples/jsm/libs/fflate.module.js';
import { beforeEach, describe, expect, test } from 'vitest';
import { retryImport } from '@/lib/imports/retry-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import { getImport } from '@/lib/imports/get-import';
import { submitImport } from '@/lib/imports/submit-import';
import { brokenObj, cubeObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, openWith, ownThread } from '../support/imports';

const text = (value: string) => new TextEncoder().encode(value);
const zip = (files: Parameters<typeof zipSync>[0]) => Uint8Array.from(zipSync(files));

let cast: Cast;
beforeEach(async () => {
  cast = await createCast();
});

const bring = async (files: Parameters<typeof importFiles>[2], options: Parameters<typeof importFiles>[3] = {}) => {
  const done = await importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral', ...options });
  return { done, files: Object.fromEntries(done.files.map((file) => [file.name, file])) };
};

const volumes = async () =>
  Object.fromEntries(
    (await asOwner<{ key: string; volume: number }>(
      `select a.code || ' ' || v.label || ' ' || p.name as key, sum(c.volume) as volume from geometry_components c join geometry_parts p on p.id = c.geometry_part_id
       join asset_versions v on v.record_id = p.record_id join assets a on a.id = v.asset_id where a.show_id = $1 group by 1 order by 1`,
      [cast.show.id],
    )).map(({ key, volume }) => [key, volume]),
  );

/** One ordinary archive: two assets, one of them in two versions, and a file that is no mesh. */
const SET = {
  'props/crate/crate_v001.obj': text(cubeObj({ size: 2 })),
  'props/crate/crate_v002.obj': text(cubeObj({ size: 3 })),
  'props/lid_v004.obj': text(cubeObj({ size: 1 })),
  'props/readme.txt': text('hello'),
};

describe('an archive of several meshes', () => {
  test('becomes a file each, with its own asset, version and outcome', async () => {
    const { done, files } = await bring({ 'drop.zip': zip({ ...SET, 'props/bad_v001.obj': text(brokenObj) }) });
    expect(Object.keys(files).sort()).toEqual(['drop.zip', 'drop/props/bad_v001.obj', 'drop/props/crate/crate_v001.obj', 'drop/props/crate/crate_v002.obj', 'drop/props/lid_v004.obj']);
    expect(files['drop.zip']).toMatchObject({ state: 'done', asset: null, remarks: ['unpacked'], unpacked_into: 4 });
    expect(files['drop/props/crate/crate_v002.obj']).toMatchObject({ state: 'done', asset: 'crate', version: 'v002' });
    expect(files['drop/props/bad_v001.obj']).toMatchObject({ state: 'failed', error: { line: 10, column: 11 } });
    expect(done.state).toBe('done');
    expect(await volumes()).toEqual({ 'crate v001 body': 8, 'crate v002 body': 27, 'lid v004 body': 1 });
  });

  test('stays one asset where somebody said which', async () => {
    const { files } = await bring({ 'drop_v001.zip': { text: zip(SET), asset: 'set' } }, { parts_by: 'whole' });
    expect(Object.keys(files)).toEqual(['drop_v001.zip']);
    expect(await volumes()).toEqual({ 'set v001 whole': 8 + 27 + 1 });
  });

  test('holds a bad entry apart with its place, and a retry fails the same way', async () => {
    const bytes = zip({ 'a_v001.obj': [text(cubeObj()), { level: 0 }], 'b_v001.obj': [text(cubeObj({ size: 4 })), { level: 0 }] });
    const view = new DataView(bytes.buffer);
    view.setUint32(view.getUint32(bytes.length - 22 + 16, true) + 16, 12345, true);
    const { done, files } = await bring({ 'drop.zip': bytes });
    const broken = { state: 'failed', error: { code: 'bad_archive', message: expect.stringContaining('a_v001.obj') } };
    expect(files['drop/a_v001.obj']).toMatchObject(broken);
    expect(files['drop/b_v001.obj']).toMatchObject({ state: 'done', asset: 'b' });
    await retryImport(cast.contextOf('td'), { show: cast.show.code, import: done.id });
    await drainQueue(cast.contextOf('td').db, ownThread);
    const again = await getImport(cast.contextOf('td'), { show: cast.show.code, import: done.id });
    expect(again.files.find((file) => file.name === 'drop/a_v001.obj')).toMatchObject(broken);
    expect(again.files).toHaveLength(3);
  });

  test('is refused whole where it is hostile, and nothing of it comes in', async () => {
    const obj = text(cubeObj());
    const { files } = await bring({
      'bomb.zip': zip({ 'a.obj': obj, 'b.obj': new Uint8Array(64_000_000) }),
      'up.zip': zip({ 'a.obj': obj, '../b.obj': obj }),
      'twice.zip': zip({ 'x/a.obj': obj, 'x//a.obj': obj }),
    });
    expect(Object.entries(files).map(([name, file]) => [name, file.error?.code]).sort()).toEqual([['bomb.zip', 'bomb'], ['twice.zip', 'duplicate'], ['up.zip', 'unsafe_name']]);
    expect(await volumes()).toEqual({});
  });

  test('tells an archive within it apart as a file that fails', async () => {
    const { files } = await bring({ 'drop.zip': zip({ 'a_v001.obj': text(cubeObj()), 'in.zip': zip({ 'b.obj': text(cubeObj()) }) }) });
    expect(files['drop/in.zip']).toMatchObject({ state: 'failed', error: { code: 'nested_archive' } });
    expect(files['drop/a_v001.obj']).toMatchObject({ state: 'done' });
  });

  test('goes beside files that were dropped under its own name', async () => {
    const { files } = await bring({ 'drop/a_v001.obj': cubeObj({ size: 5 }), 'drop.zip': zip({ 'a_v002.obj': text(cubeObj()), 'a_v001.obj': text(cubeObj({ size: 6 })) }) });
    expect(Object.keys(files).sort()).toEqual(['drop.zip', 'drop.zip/a_v001.obj', 'drop.zip/a_v002.obj', 'drop/a_v001.obj']);
    expect(Object.values(files).every((file) => file.state === 'done')).toBe(true);
  });

  test('brings nothing twice when its work is done again from the beginning', async () => {
    const context = cast.contextOf('td');
    const id = await openWith(context, cast.show.code, { 'drop.zip': zip(SET) }, { scheme: 'polyhedral' });
    await submitImport(context, { show: cast.show.code, import: id });
    // The first worker dies when everything is stored and nothing written down.
    await asOwner(`create function fail_once() returns trigger language plpgsql as $$ begin raise exception 'gone'; end $$`);
    await asOwner('create trigger fail_once before insert on import_files for each row execute function fail_once()');
    await drainQueue(context.db, ownThread).catch(() => undefined);
    expect(await asOwner('select name from import_files where import_id = $1', [id])).toHaveLength(1);
    await asOwner('drop trigger fail_once on import_files');
    await asOwner(`update import_files set try_after = null, lease_by = null, lease_until = null where import_id = $1`, [id]);
    await asOwner(`update pgboss.job set start_after = now() where name = 'import-files' and state < 'active'`);
    await drainQueue(context.db, ownThread);
    expect(await asOwner(`select name, state from import_files where import_id = $1 order by name`, [id])).toEqual(
      ['drop.zip', 'drop/props/crate/crate_v001.obj', 'drop/props/crate/crate_v002.obj', 'drop/props/lid_v004.obj'].map((name) => ({ name, state: 'done' })),
    );
  });
});

describe('an archive of one mesh', () => {
  test('is that mesh, with its weights', async () => {
    const weights = ['vertex,joint,weight', ...[1, 2, 3, 4].map((v) => `${v},hip,1`), ...[5, 6, 7, 8].map((v) => `${v},knee,1`)].join('\n');
    const { files } = await bring({ 'leg_v001.zip': zip({ 'leg.obj': text(cubeObj()), 'leg.weights.csv': text(weights) }) }, { parts_by: 'joint' });
    expect(files).toMatchObject({ 'leg_v001.zip': { state: 'done', asset: 'leg', parts: 2 } });
  });
});

describe('files that are read with another', () => {
  const weightsOf = (joint: string) => ['vertex,joint,weight', ...[1, 2, 3, 4].map((v) => `${v},hip,1`), ...[5, 6, 7, 8].map((v) => `${v},${joint},1`)].join('\n');

  test('skin weights beside an OBJ give its parts, and other weights another version', async () => {
    const { files } = await bring({ 'ox/leg_v001.obj': cubeObj(), 'ox/leg_v001.weights.csv': weightsOf('knee') }, { parts_by: 'joint' });
    expect(files['ox/leg_v001.obj']).toMatchObject({ state: 'done', asset: 'leg', parts: 2 });
    expect(files['ox/leg_v001.weights.csv']).toMatchObject({ state: 'done', asset: null, remarks: ['read_beside'] });
    expect(Object.keys(await volumes()).sort()).toEqual(['leg v001 hip', 'leg v001 knee']);
    const again = await bring({ 'ox/leg_v001.obj': cubeObj(), 'ox/leg_v001.weights.csv': weightsOf('knee') }, { parts_by: 'joint' });
    expect(again.files['ox/leg_v001.obj'].remarks).toContain('unchanged');
    const other = await bring({ 'ox/leg_v001.obj': cubeObj(), 'ox/leg_v001.weights.csv': weightsOf('shin') }, { parts_by: 'joint' });
    expect(other.files['ox/leg_v001.obj']).toMatchObject({ version: 'v001-2', remarks: ['next_take'] });
  });

  test('that fit no mesh are said', async () => {
    const { files } = await bring({ 'leg_v001.weights.csv': weightsOf('knee'), 'a_v001.obj': cubeObj() });
    expect(files['leg_v001.weights.csv']).toMatchObject({ state: 'failed', error: { code: 'no_mesh_beside', message: expect.stringContaining('leg_v001.obj') } });
  });

  test('layers that another one of the archive refers to are no assets of their own; in it they are', async () => {
    const mesh = (at: number) => `def Mesh "box"\n{\n  point3f[] points = [${[[0, 0, 0], [1, 0, 0], [0, 1, 0], [0, 0, 1]].map((p) => `(${p[0] + at}, ${p[1]}, ${p[2]})`).join(', ')}]\n  int[] faceVertexCounts = [3, 3, 3, 3]\n  int[] faceVertexIndices = [0, 2, 1, 0, 1, 3, 0, 3, 2, 1, 2, 3]\n}\n`;
    const { files } = await bring({
      'drop.zip': zip({
        'ox_v001.usda': text('#usda 1.0\ndef "ox" (\n  references = @./geo/body.usda@</box>\n)\n{\n}\n'),
        'geo/body.usda': text(`#usda 1.0\n${mesh(0)}`),
        'fin_v001.usda': text(`#usda 1.0\n${mesh(2)}`),
      }),
    });
    expect(Object.entries(files).map(([name, file]) => [name, file.state, file.asset])).toEqual([
      ['drop.zip', 'done', null], ['drop/fin_v001.usda', 'done', 'fin'], ['drop/geo/body.usda', 'done', null], ['drop/ox_v001.usda', 'done', 'ox'],
    ]);
    // The tetrahedron of the unit axes has 1/6.
    for (const volume of Object.values(await volumes())) expect(volume).toBeCloseTo(1 / 6, 14);
  });
});
