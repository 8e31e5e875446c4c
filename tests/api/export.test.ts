import { createHash } from 'node:crypto';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import { PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { GET as GET_CSV } from '@/app/api/v1/shows/[show]/export.csv/route';
import { GET as GET_JSON } from '@/app/api/v1/shows/[show]/export.json/route';
import { call, eachCaller, expectProblem } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage, type TestPart } from '../support/put-cage';

/** numbers.md: the default columns, in this order. */
const HEADER =
  'schema,show,sequence,shot,copy,asset,outside_id,category,version,row,part,body,joint,variant,scale,construction,material,density_kg_m3,areal_density_kg_m2,wall_m,target_mass_kg,area_m2,volume_m3,mass_kg,com_x_m,com_y_m,com_z_m,' +
  'ixx_kg_m2,iyy_kg_m2,izz_kg_m2,ixy_kg_m2,ixz_kg_m2,iyz_kg_m2,i1_kg_m2,i2_kg_m2,i3_kg_m2,axes_quat_w,axes_quat_x,axes_quat_y,axes_quat_z,free_axes,space,up_axis,numeric_error,adjusted,warnings,state,reason,locked_at,part_id,value_id,value_sha256';

/** Vertices of F. Tonon, J. Math. Stat. 1 (2004) 8-11. */
const TONON: TestPart = {
  name: 'tetrahedron',
  positions: [[8.3322, -11.86875, 0.93355], [0.75523, 5, 16.37072], [52.61236, 5, -5.3858], [2, 5, 3]],
  faces: [[0, 2, 1], [0, 1, 3], [0, 3, 2], [1, 2, 3]],
};
/** The same paper's example at density 1, computed exactly (the printed b′ and c′ are swapped there). */
const TONON_VALUES = {
  volume_m3: 1873.233364, com_x_m: 15.9249475, com_y_m: 0.7828125, com_z_m: 3.7296175,
  ixx_kg_m2: 43520.33329, iyy_kg_m2: 194711.29259, izz_kg_m2: 191168.76489, ixy_kg_m2: -11996.20139, ixz_kg_m2: 46343.16738, iyz_kg_m2: -4417.66157,
};

type Row = Record<string, string>;

async function createShow(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'stone', [TONON]);
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('lid', [10, 0, 0], [11, 1, 1]), boxPart('=body', [0, 0, 0], [2, 3, 4]), boxPart('Z, "odd"', [20, 0, 0], [21, 1, 1])]);
  await set(cast, { asset: 'stone', part: 'tetrahedron', revision: 1, density_kg_m3: 1 });
  await set(cast, { asset: 'crate', part: '=body', revision: 1, target_mass_kg: 0.1 });
  await set(cast, { asset: 'crate', part: 'lid', revision: 1, left_out: true });
  return cast;
}

async function set(cast: Cast, item: object): Promise<void> {
  const answer = await call(PATCH, { method: 'PATCH', params: { show: cast.show.code }, body: { items: [item] }, token: cast.people.td.token });
  expect(answer.status, answer.text).toBe(200);
}

const getCsv = (cast: Cast, query: Record<string, string> = {}, headers: Record<string, string> = {}) =>
  call(GET_CSV, { params: { show: cast.show.code }, query, headers, token: cast.people.artist.token });

const rowsIn = (csv: string): Row[] => Papa.parse<Row>(csv, { header: true, skipEmptyLines: true }).data;
const receiptsOf = (cast: Cast) => asOwner<{ sha256: string; rows: number; selection: string; format: string; user_id: string }>('select * from receipts where show_id = $1 order by created_at', [cast.show.id]);

for (const [format, handler] of [['csv', GET_CSV], ['json', GET_JSON]] as const) {
  eachCaller(`export.${format}`, handler, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['receipts', 'part_current'], async (caller) => {
    const cast = await createShow();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });
}

describe('the CSV', () => {
  test('has the header of the design, CRLF and no byte order mark', async () => {
    const { text, headers } = await getCsv(await createShow());
    expect(text.split('\r\n')[0]).toBe(HEADER);
    expect(text.endsWith('\r\n')).toBe(true);
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    expect(headers.get('content-type')).toBe('text/csv; charset=utf-8; header=present');
    expect(headers.get('content-disposition')).toMatch(/^attachment; filename="show[0-9a-f]+_parts\.csv"$/);
  });

  test('holds every part but what is left out, by asset and part, with names as they are', async () => {
    const rows = rowsIn((await getCsv(await createShow())).text);
    expect(rows.map((row) => [row.asset, row.part, row.state])).toEqual([
      ['crate', '=body', 'measured'],
      ['crate', 'Z, "odd"', 'unset'],
      ['stone', 'tetrahedron', 'measured'],
    ]);
    expect(rows[1]).toMatchObject({ mass_kg: '', ixx_kg_m2: '', value_sha256: '', row: 'part', scale: '1', space: 'crate', up_axis: 'y', version: 'v001' });
    expect(Number(rows[1].volume_m3)).toBeCloseTo(1, 12);
  });

  test('gives the published tetrahedron: volume, centre and all six matrix entries', async () => {
    const row = rowsIn((await getCsv(await createShow(), { asset: 'stone' })).text)[0];
    for (const [name, value] of Object.entries(TONON_VALUES)) expect(Math.abs(Number(row[name]) / value - 1), name).toBeLessThan(2e-8);
    expect(Number(row.mass_kg)).toBe(Number(row.volume_m3));
  });

  test('its quaternion turns the principal moments into the matrix', async () => {
    const row = rowsIn((await getCsv(await createShow(), { asset: 'stone' })).text)[0];
    const [w, x, y, z] = ['w', 'x', 'y', 'z'].map((name) => Number(row[`axes_quat_${name}`]));
    expect(w).toBeGreaterThanOrEqual(0);
    const r = [
      [1 - 2 * (y * y + z * z), 2 * (x * y - w * z), 2 * (x * z + w * y)],
      [2 * (x * y + w * z), 1 - 2 * (x * x + z * z), 2 * (y * z - w * x)],
      [2 * (x * z - w * y), 2 * (y * z + w * x), 1 - 2 * (x * x + y * y)],
    ];
    const moments = [1, 2, 3].map((i) => Number(row[`i${i}_kg_m2`]));
    const entry = (i: number, j: number): number => moments.reduce((sum, moment, k) => sum + moment * r[i][k] * r[j][k], 0);
    for (const [name, i, j] of [['ixx', 0, 0], ['iyy', 1, 1], ['izz', 2, 2], ['ixy', 0, 1], ['ixz', 0, 2], ['iyz', 1, 2]] as const) {
      expect(Math.abs(entry(i, j) - Number(row[`${name}_kg_m2`])) / moments[2], name).toBeLessThan(1e-12);
    }
  });

  test('reads back as the doubles that are stored', async () => {
    const cast = await createShow();
    const [stored] = await asOwner<Record<string, number>>(`select mass_kg, density_kg_m3, ixx_kg_m2, axes_quat_x, volume_m3 from part_current where show_id = $1 and part = '=body'`, [cast.show.id]);
    const row = rowsIn((await getCsv(cast)).text)[0];
    for (const [name, value] of Object.entries(stored)) expect(Number(row[name]), name).toBe(value);
    expect(row.mass_kg).toBe('0.1');
  });

  test('guards names for a spreadsheet only when asked', async () => {
    const cast = await createShow();
    expect(rowsIn((await getCsv(cast, { guard: '1' })).text)[0].part).toBe("'=body");
    expect(rowsIn((await getCsv(cast)).text)[0].part).toBe('=body');
  });

  test('takes states and assets, and names what it does not know', async () => {
    const cast = await createShow();
    expect(rowsIn((await getCsv(cast, { state: 'measured' })).text)).toHaveLength(2);
    expect(rowsIn((await getCsv(cast, { state: 'measured,unset', asset: 'crate' })).text)).toHaveLength(2);
    expect(rowsIn((await getCsv(cast, { asset: 'nothing' })).text)).toHaveLength(0);
    expectProblem(await getCsv(cast, { state: 'heavy' }), 422, 'bad_input', 'state.0');
    expectProblem(await getCsv(cast, { state: 'left_out' }), 422, 'bad_input', 'state');
    expectProblem(await getCsv(cast, { profile: 'ragdoll' }), 422, 'bad_input', 'profile');
    expectProblem(await getCsv(cast, { parts: 'all' }), 422, 'bad_input');
  });
});

test('the JSON has the CSV’s columns as fields, numbers as numbers and absent as null', async () => {
  const cast = await createShow();
  const csv = rowsIn((await getCsv(cast)).text);
  const answer = await call(GET_JSON, { params: { show: cast.show.code }, token: cast.people.artist.token });
  const items = (answer.json as { items: Record<string, string | number | null>[] }).items;
  expect(answer.json).toMatchObject({ schema: 'weighhouse-1', show: cast.show.code });
  expect(items).toHaveLength(csv.length);
  items.forEach((item, i) => {
    expect(Object.keys(item).join()).toBe(HEADER);
    for (const [name, value] of Object.entries(item)) expect(value === null ? '' : String(value), name).toBe(csv[i][name]);
  });
});

describe('the tag and the receipt', () => {
  test('the tag is the hash of the bytes, and who has them gets 304', async () => {
    const cast = await createShow();
    const first = await getCsv(cast);
    const sha256 = createHash('sha256').update(first.text, 'utf8').digest('hex');
    expect(first.headers.get('etag')).toBe(`"${sha256}"`);
    expect(first.headers.get('content-length')).toBe(String(Buffer.byteLength(first.text)));
    const again = await getCsv(cast, {}, { 'if-none-match': `"other", "${sha256}"` });
    expect(again.status).toBe(304);
    expect(again.text).toBe('');
    await set(cast, { asset: 'stone', part: 'tetrahedron', revision: 2, density_kg_m3: 2 });
    const changed = await getCsv(cast, {}, { 'if-none-match': `"${sha256}"` });
    expect(changed.status).toBe(200);
    expect(changed.headers.get('etag')).not.toBe(`"${sha256}"`);
  });

  test('a token that takes the same bytes again on one day has one receipt', async () => {
    const cast = await createShow();
    const { text } = await getCsv(cast, { state: 'measured' });
    await getCsv(cast, { state: 'measured' });
    const receipts = await receiptsOf(cast);
    expect(receipts).toHaveLength(1);
    expect(receipts[0]).toMatchObject({ rows: 2, selection: 'state=measured', format: 'csv', user_id: cast.people.artist.id, sha256: createHash('sha256').update(text, 'utf8').digest('hex') });
    await getCsv(cast);
    expect(await receiptsOf(cast)).toHaveLength(2);
  });

  test('who breaks off, or is told 304, has no receipt', async () => {
    const cast = await createShow();
    const url = new URL('http://127.0.0.1:3000/api/v1/test');
    const request = () => new Request(url, { headers: { host: url.host, authorization: `Bearer ${cast.people.artist.token}` } });
    const params = Promise.resolve({ show: cast.show.code });
    const response = await GET_CSV(request(), { params });
    await response.body?.cancel();
    const etag = response.headers.get('etag') ?? '';
    await getCsv(cast, {}, { 'if-none-match': etag });
    expect(await receiptsOf(cast)).toHaveLength(0);
  });

  test('many at once get the same bytes', async () => {
    const cast = await createShow();
    const answers = await Promise.all(Array.from({ length: 12 }, () => getCsv(cast)));
    expect(new Set(answers.map((one) => one.text)).size).toBe(1);
    expect(answers.every((one) => one.status === 200)).toBe(true);
  });
});
