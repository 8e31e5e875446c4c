import { beforeEach, describe, expect, test } from 'vitest';
import { editShow } from '@/lib/shows/edit-show';
import { GOOD } from '../support/bad-files';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles } from '../support/imports';

const textOf = (name: string) => new TextDecoder().decode(GOOD.find((one) => one.name === name)!.bytes);

/** A tapered block with a crease and two joints in metres, Z up; all coordinates are short in binary, so that a float holds them and their hundredfold. */
const LOW = [[-0.25, -0.5, 0.125], [0.75, -0.5, 0.125], [0.75, 0.25, 0.125], [-0.25, 0.25, 0.125]];
const POINTS = [...LOW, ...LOW.map(([x, y, z]) => [x / 2 + 0.0625, y / 2, z + 1.25])];
const QUADS = [[0, 3, 2, 1], [4, 5, 6, 7], [0, 1, 5, 4], [1, 2, 6, 5], [2, 3, 7, 6], [3, 0, 4, 7]];
const TRIANGLES = QUADS.flatMap(([a, b, c, d]) => [[a, b, c], [a, c, d]]);
/** The same in centimetres with Y up: turned by a quarter about X. */
const IN_SHOW = POINTS.map(([x, y, z]) => [100 * x, 100 * z, -100 * y]);

const asObj = (points: number[][], faces: number[][], more = '') => `${points.map((p) => `v ${p.join(' ')}`).join('\n')}\n${faces.map((f) => `f ${f.map((v) => v + 1).join(' ')}`).join('\n')}\n${more}`;

function asUsda(points: number[][], faces: number[][]): string {
  const tuple = (p: number[]) => `(${p.join(', ')})`;
  return `#usda 1.0
(
    metersPerUnit = 1
    upAxis = "Z"
)
def Mesh "block"
{
    point3f[] points = [${points.map(tuple).join(', ')}]
    int[] faceVertexCounts = [${faces.map((f) => f.length).join(', ')}]
    int[] faceVertexIndices = [${faces.flat().join(', ')}]
    uniform token subdivisionScheme = "catmullClark"
    int[] creaseIndices = [0, 1, 2]
    int[] creaseLengths = [3]
    float[] creaseSharpnesses = [2.5]
}
`;
}

/** glTF is in metres with Y up by its standard; as binary. */
function asGlb(points: number[][], faces: number[][]): Uint8Array<ArrayBuffer> {
  const positions = new Uint8Array(Float32Array.from(points.flat()).buffer);
  const indices = new Uint8Array(Uint16Array.from(faces.flat()).buffer);
  const json = JSON.stringify({
    asset: { version: '2.0' }, scene: 0, scenes: [{ nodes: [0] }], nodes: [{ mesh: 0 }], meshes: [{ primitives: [{ attributes: { POSITION: 0 }, indices: 1 }] }],
    accessors: [{ bufferView: 0, componentType: 5126, count: points.length, type: 'VEC3' }, { bufferView: 1, componentType: 5123, count: 3 * faces.length, type: 'SCALAR' }],
    bufferViews: [{ buffer: 0, byteOffset: 0, byteLength: positions.length }, { buffer: 0, byteOffset: positions.length, byteLength: indices.length }],
    buffers: [{ byteLength: positions.length + indices.length }],
  });
  const text = new TextEncoder().encode(json.padEnd(Math.ceil(json.length / 4) * 4));
  const words = (...values: number[]) => new Uint8Array(Uint32Array.from(values).buffer);
  const total = 12 + 8 + text.length + 8 + positions.length + indices.length;
  return Uint8Array.from([...words(0x46546c67, 2, total, text.length, 0x4e4f534a), ...text, ...words(positions.length + indices.length, 0x004e4942), ...positions, ...indices]);
}

interface Numbers {
  asset: string;
  /** Volume, centroid, second moments; area and its moments; the cage's own; the wall's polynomials. */
  numbers: number[];
  unit_scale: number;
  turn: string;
}

async function numbersOf(cast: Cast): Promise<Map<string, Numbers>> {
  const rows = await asOwner<Numbers>(
    `select a.code as asset, r.unit_scale, r.turn,
       array[c.volume] || c.centroid || c.central_second || array[c.area] || c.surface_centroid || c.surface_central_second || array[c.cage_volume] || c.cage_centroid || c.cage_central_second
         || c.hollow || array[p.min_x, p.min_y, p.min_z, p.max_x, p.max_y, p.max_z] as numbers
     from geometry_components c join geometry_parts p on p.id = c.geometry_part_id join geometry_records r on r.id = p.record_id
     join asset_versions v on v.record_id = r.id join assets a on a.id = v.asset_id where a.show_id = $1`,
    [cast.show.id],
  );
  return new Map(rows.map((row) => [row.asset, row]));
}

/** Each number to 1e-13 of the largest of its kind: moments that vanish by symmetry have no digits of their own. */
function expectSame(found: Numbers, wanted: Numbers): void {
  expect(found.numbers).toHaveLength(wanted.numbers.length);
  const kinds = [1, 3, 6, 1, 3, 6, 1, 3, 6];
  let at = 0;
  for (const length of [...kinds, ...Array.from({ length: Math.round((wanted.numbers.length - 30 - 6) / 5) }, () => 5), 6]) {
    const largest = Math.max(...wanted.numbers.slice(at, at + length).map(Math.abs), 1);
    for (let i = at; i < at + length; i++) expect(Math.abs(found.numbers[i] - wanted.numbers[i]) / largest, `number ${i}`).toBeLessThan(1e-13);
    at += length;
  }
}

let cast: Cast;
beforeEach(async () => {
  cast = await createCast();
});

const bring = async (files: Parameters<typeof importFiles>[2], options: Parameters<typeof importFiles>[3] = {}) => {
  const done = await importFiles(cast.contextOf('td'), cast.show.code, files, { parts_by: 'whole', ...options });
  return Object.fromEntries(done.files.map((file) => [file.name, file]));
};

describe('a show in centimetres with Y up', () => {
  test('takes a layer in metres with Z up for what it is: the same numbers as the cage written its own way, creases and walls included', async () => {
    const crease = 't crease 2/1/0 0 1 2.5\nt crease 2/1/0 1 2 2.5\n';
    const files = await bring({ 'own_v001.obj': asObj(IN_SHOW, QUADS, crease), 'other_v001.usda': asUsda(POINTS, QUADS) });
    expect(files['own_v001.obj'].remarks).toEqual([]);
    expect(files['other_v001.usda']).toMatchObject({ state: 'done', remarks: ['converted_unit', 'turned_axis'] });
    const numbers = await numbersOf(cast);
    expect(numbers.get('other')).toMatchObject({ unit_scale: 100, turn: 'z-to-y' });
    expect(numbers.get('own')).toMatchObject({ unit_scale: 1, turn: 'none' });
    expectSame(numbers.get('other')!, numbers.get('own')!);
    const notes = await asOwner<{ message: string; severity: string }>(`select message, severity from findings where code in ('converted_unit', 'turned_axis') order by code`);
    expect(notes.map((note) => note.message)).toEqual(['The file is in metres, the show in centimetres: its lengths were multiplied by 100.', 'The file has Z up, the show Y up: it was turned by a quarter about X.']);
  });

  test('takes a GLB, which is in metres by its standard', async () => {
    const upright = POINTS.map(([x, y, z]) => [x, z, -y]);
    const files = await bring({ 'own_v001.obj': asObj(IN_SHOW, TRIANGLES), 'other_v001.glb': { text: asGlb(upright, TRIANGLES) } }, { scheme: 'loop' });
    expect(files['other_v001.glb']).toMatchObject({ state: 'done', remarks: ['converted_unit'] });
    const numbers = await numbersOf(cast);
    expect(numbers.get('other')).toMatchObject({ unit_scale: 100, turn: 'none' });
    expectSame(numbers.get('other')!, numbers.get('own')!);
  });

  test('refuses both where it converts nothing, with both units named, and what was there stands', async () => {
    await bring({ 'block_v001.usda': asUsda(POINTS, QUADS) });
    const before = await numbersOf(cast);
    await editShow(cast.contextOf('lead'), { show: cast.show.code, other_space: 'refuse' });
    const files = await bring({ 'block_v001.usda': asUsda(POINTS, QUADS), 'block_v002.glb': { text: asGlb(POINTS, TRIANGLES) } });
    for (const file of Object.values(files)) {
      expect(file).toMatchObject({ state: 'failed', error: { code: 'units_disagree', message: expect.stringMatching(/centimetres.*metres/) } });
    }
    expect(await numbersOf(cast)).toEqual(before);
  });

  test('does what the show said when the import was opened', async () => {
    const rows = await asOwner<{ other_space: string }>('select other_space from shows where id = $1', [cast.show.id]);
    expect(rows[0].other_space).toBe('convert');
    await expect(editShow(cast.contextOf('td'), { show: cast.show.code, other_space: 'refuse' })).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('shows of different spaces', () => {
  test('measure the same bytes each in their own, and use each their own again', async () => {
    const others = { cm: cast, m: await createCast({ linearUnit: 'm', upAxis: 'z' }), in: await createCast({ linearUnit: 'in' }) };
    const text = asUsda(POINTS, QUADS);
    for (const [unit, scale, turn] of [['cm', 100, 'z-to-y'], ['m', 1, 'none'], ['in', 1 / 0.0254, 'z-to-y']] as const) {
      cast = others[unit];
      await bring({ 'block_v001.usda': text });
      expect((await numbersOf(cast)).get('block'), unit).toMatchObject({ turn, unit_scale: expect.closeTo(scale, 13) });
    }
    for (const unit of ['in', 'cm', 'm'] as const) {
      cast = others[unit];
      const again = await bring({ 'block_v001.usda': text });
      expect(again['block_v001.usda'].remarks[0], unit).toBe('unchanged');
    }
    const records = await asOwner<{ id: string }>(`select distinct v.record_id as id from asset_versions v join assets a on a.id = v.asset_id where a.show_id = any($1)`, [Object.values(others).map((one) => one.show.id)]);
    expect(records).toHaveLength(3);
    const volumes = await asOwner<{ unit: string; volume_m3: number }>(`select w.linear_unit as unit, c.volume_m3 from part_current c join shows w on w.id = c.show_id where c.asset = 'block' and w.id = any($1)`, [Object.values(others).map((one) => one.show.id)]);
    expect(volumes).toHaveLength(3);
    for (const { unit, volume_m3 } of volumes) expect(volume_m3 / volumes[0].volume_m3, unit).toBeCloseTo(1, 13);
  });

  test('take up another show’s record where it is in their space, without reading the file', async () => {
    const twin = await createCast();
    await bring({ 'block_v001.usda': asUsda(POINTS, QUADS) });
    cast = twin;
    await bring({ 'block_v001.usda': asUsda(POINTS, QUADS) });
    const [{ records }] = await asOwner<{ records: string }>(`select count(distinct v.record_id) as records from asset_versions v join assets a on a.id = v.asset_id where a.code = 'block' and v.record_id in (select record_id from asset_versions w join assets b on b.id = w.asset_id where b.show_id = $1)`, [twin.show.id]);
    expect(Number(records)).toBe(1);
  });
});

test('a file that states nothing is the show’s', async () => {
  const files = await bring({ 'fin_v001.usda': textOf('a.usda').replace(/\(\n.*?\n\)\n/s, '') }, { scheme: 'polyhedral' });
  expect(files['fin_v001.usda']).toMatchObject({ state: 'done', remarks: [] });
  // The tetrahedron of the unit axes has 1/6.
  expect((await numbersOf(cast)).get('fin')!.numbers[0]).toBeCloseTo(1 / 6, 14);
});
