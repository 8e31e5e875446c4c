import { beforeAll, describe, expect, test } from 'vitest';
import { GET, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { GET as GET_MATERIALS } from '@/app/api/v1/shows/[show]/materials/route';
import { GET as GET_ASSET } from '@/app/api/v1/shows/[show]/assets/[asset]/route';
import { GET as GET_PART } from '@/app/api/v1/shows/[show]/assets/[asset]/parts/[part]/route';
import { PART_SORTS } from '@/lib/rules/inputs/list-parts';
import type { AssetDetail, PartDetail } from '@/lib/rules/part-detail';
import type { PartPage, PartRow } from '@/lib/rules/part-row';
import { VALUE_STATES } from '@/lib/rules/states';
import { call, eachCaller, expectProblem } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

const ASSETS = ['Zebra', 'apple', 'ärmel', 'box_2', 'box_10'];
const CATEGORIES = ['creature', 'prop', 'costume', 'prop', 'set'] as const;
let cast: Cast;

/** Five assets of five parts; sizes, masses and materials repeat, so that every order has ties and gaps. */
beforeAll(async () => {
  cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await asOwner(`insert into materials (show_id, name, category, density_kg_m3, source, from_memory) values ($1, 'bog oak', 'wood', 900, 'invented', true), ($1, 'Felt', 'cloth', 200, 'invented', true)`, [cast.show.id]);
  for (const [i, asset] of ASSETS.entries()) {
    const parts = [0, 1, 2, 3, 4].map((j) => boxPart(`part_${j}${j % 2 ? '_L' : ''}`, [10 * j, 0, 0], [10 * j + 1 + (j % 3), 1, 1], j === 4 && i % 2 === 0));
    await putCage(cast.show, cast.people.td, asset, parts, { category: CATEGORIES[i] });
  }
  const items = ASSETS.flatMap((asset, i) => [
    { asset, part: 'part_0', revision: 1, density_kg_m3: 100 * (1 + (i % 2)) },
    { asset, part: 'part_1_L', revision: 1, material: i % 2 ? 'felt' : 'bog oak' },
    { asset, part: 'part_2', revision: 1, left_out: i === 0 },
  ]);
  const answer = await call(PATCH, { method: 'PATCH', params: { show: cast.show.code }, body: { items }, token: cast.people.td.token });
  expect(answer.status, answer.text).toBe(200);
});

async function list(query: Record<string, string> = {}): Promise<PartPage> {
  const answer = await call(GET, { params: { show: cast.show.code }, query, token: cast.people.artist.token });
  expect(answer.status, answer.text).toBe(200);
  return answer.json as unknown as PartPage;
}

const keyOf = (row: PartRow): string => `${row.asset}/${row.part}`;
const byCodePoint = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

async function walk(query: Record<string, string>): Promise<PartRow[]> {
  const rows: PartRow[] = [];
  for (let page = await list(query); ; page = await list({ ...query, cursor: page.next_cursor! })) {
    rows.push(...page.items);
    if (page.next_cursor === null) return rows;
  }
}

describe('pages', () => {
  test.each(PART_SORTS.flatMap((sort) => [sort, `-${sort}`]))('by %s hold every row once, in order, rows without a value last', async (sort) => {
    const rows = await walk({ sort, limit: '7' });
    expect(new Set(rows.map(keyOf)).size).toBe(25);
    const name = sort.replace('-', '') as keyof PartRow;
    const valueOf = (row: PartRow) => (name === 'state' ? VALUE_STATES.findIndex((state) => state === row.state) : (row[name] as string | number | null));
    const sign = sort.startsWith('-') ? -1 : 1;
    const expected = rows.toSorted((a, b) => {
      const [x, y] = [valueOf(a), valueOf(b)];
      if (x === null || y === null) return x === y ? byCodePoint(a.asset, b.asset) || byCodePoint(a.part!, b.part!) : x === null ? 1 : -1;
      const compared = typeof x === 'string' ? byCodePoint(x, String(y)) : x - Number(y);
      return compared * sign || byCodePoint(a.asset, b.asset) || byCodePoint(a.part!, b.part!);
    });
    expect(rows.map(keyOf)).toEqual(expected.map(keyOf));
  });

  test('the first one has the counts, all have the totals of their assets', async () => {
    const first = await list({ limit: '5' });
    expect(first.counts).toMatchObject({ total: 25, assets: 5, by_category: { prop: 10, creature: 5, costume: 5, set: 5 } });
    expect(first.counts?.by_state.left_out).toBe(1);
    const second = await list({ limit: '5', cursor: first.next_cursor! });
    expect(second.counts).toBeNull();
    expect(second.assets.map((one) => one.asset)).toEqual([...new Set(second.items.map((row) => row.asset))]);
  });

  test('a cursor of another order, or none of ours, is refused by name', async () => {
    const { next_cursor: cursor } = await list({ limit: '5', sort: 'mass_kg' });
    const get = (query: Record<string, string>) => call(GET, { params: { show: cast.show.code }, query, token: cast.people.artist.token });
    expectProblem(await get({ sort: 'asset', cursor: cursor! }), 422, 'bad_input', 'cursor');
    for (const forged of ['x', Buffer.from('["mass_kg","abc","a","b"]').toString('base64url')]) {
      expectProblem(await get({ sort: 'mass_kg', cursor: forged }), 422, 'bad_input', 'cursor');
    }
  });
});

describe('totals of an asset', () => {
  test('are those of its parts by the parallel-axis theorem', async () => {
    const page = await list({ asset: 'apple' });
    const [total] = page.assets;
    const parts = page.items.filter((row) => row.mass_kg !== null);
    expect(parts.length).toBe(2);
    const mass = parts.reduce((sum, row) => sum + row.mass_kg!, 0);
    const centre = (['com_x_m', 'com_y_m', 'com_z_m'] as const).map((axis) => parts.reduce((sum, row) => sum + row.mass_kg! * row[axis]!, 0) / mass);
    expect(total.mass_kg).toBeCloseTo(mass, 10);
    expect(total.com_x_m).toBeCloseTo(centre[0], 12);
    const iyy = parts.reduce((sum, row) => sum + row.iyy_kg_m2! + row.mass_kg! * ((row.com_x_m! - centre[0]) ** 2 + (row.com_z_m! - centre[2]) ** 2), 0);
    expect(total.iyy_kg_m2! / iyy).toBeCloseTo(1, 12);
    expect(total).toMatchObject({ parts: 5, without_mass: 3, state: 'unset' });
  });

  test('leave out what is left out', async () => {
    const [total] = (await list({ asset: 'Zebra' })).assets;
    const rows = (await list({ asset: 'Zebra' })).items;
    expect(rows.find((row) => row.state === 'left_out')?.part).toBe('part_2');
    const volume = rows.filter((row) => row.state !== 'left_out').reduce((sum, row) => sum + (row.volume_m3 ?? 0), 0);
    expect(total.volume_m3).toBeCloseTo(volume, 12);
  });
});

describe('filters', () => {
  test.each([
    [{ asset: 'apple' }, (row: PartRow) => row.asset === 'apple'],
    [{ category: 'prop' }, (row: PartRow) => row.category === 'prop'],
    [{ category: 'prop,set' }, (row: PartRow) => ['prop', 'set'].includes(row.category)],
    [{ state: 'measured' }, (row: PartRow) => row.state === 'measured'],
    [{ state: 'unset,left_out' }, (row: PartRow) => ['unset', 'left_out'].includes(row.state)],
    [{ q: 'BOX _l' }, (row: PartRow) => row.asset.startsWith('box') && row.part!.includes('_L')],
    [{ q: 'felt' }, (row: PartRow) => row.material === 'Felt'],
    [{ q: '%' }, () => false],
    [{ row: 'part' }, () => true],
    [{ row: 'body' }, () => false],
    [{ problem: 'any' }, (row: PartRow) => row.problems.some((one) => one.severity === 'problem')],
  ])('%o', async (query, keeps) => {
    const all = await list({ limit: '1000' });
    const expected = all.items.filter(keeps).map(keyOf);
    expect((await list({ limit: '1000', ...query })).items.map(keyOf)).toEqual(expected);
  });

  test.each([
    [{ state: 'heavy' }, 'state.0'],
    [{ category: 'creature,plants' }, 'category.1'],
    [{ sort: 'colour' }, 'sort'],
    [{ limit: '0' }, 'limit'],
    [{ limit: '5000' }, 'limit'],
    [{ row: 'shot' }, 'row'],
    [{ problem: 'Open Border' }, 'problem'],
    [{ changed_since: 'yesterday' }, 'changed_since'],
    [{ page: '2' }, undefined],
  ])('%o is refused by name', async (query, field) => {
    const answer = await call(GET, { params: { show: cast.show.code }, query: query as unknown as Record<string, string>, token: cast.people.artist.token });
    const problem = expectProblem(answer, 422, 'bad_input', field);
    if (field === undefined) expect(problem.detail).toContain('page');
  });

  test('changed_since gives what changed after the revision that a page told', async () => {
    const { revision } = await list();
    expect((await list({ changed_since: String(revision) })).items).toEqual([]);
    const answer = await call(PATCH, {
      method: 'PATCH',
      params: { show: cast.show.code },
      body: { items: [{ asset: 'apple', part: 'part_3_L', revision: 1, target_mass_kg: 4 }] },
      token: cast.people.td.token,
    });
    expect(answer.status).toBe(200);
    const since = await list({ changed_since: String(revision) });
    expect(since.items.map(keyOf)).toEqual(['apple/part_3_L']);
    expect(since.revision).toBe(revision + 1);
  });
});

describe('one part and one asset', () => {
  eachCaller('a part', GET_PART, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['part_current'], async (caller) => ({
    params: { show: cast.show.code, asset: 'apple', part: 'part_0' },
    token: cast.tokenOf(caller),
  }));
  eachCaller('an asset', GET_ASSET, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['part_current'], async (caller) => ({
    params: { show: cast.show.code, asset: 'apple' },
    token: cast.tokenOf(caller),
  }));
  eachCaller('materials', GET_MATERIALS, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['materials'], async (caller) => ({
    params: { show: cast.show.code },
    token: cast.tokenOf(caller),
  }));

  test('a part tells what was set on it, newest first, and its volume in each version', async () => {
    const own = await createCast({ linearUnit: 'cm', scheme: 'polyhedral' });
    await putCage(own.show, own.people.td, 'post', [boxPart('shaft', [0, 0, 0], [10, 10, 10])]);
    const set = (revision: number, density: number) =>
      call(PATCH, { method: 'PATCH', params: { show: own.show.code }, body: { items: [{ asset: 'post', part: 'shaft', revision, density_kg_m3: density }] }, token: own.people.lead.token });
    await set(1, 500);
    await set(2, 600);
    await putCage(own.show, own.people.td, 'post', [boxPart('shaft', [0, 0, 0], [10, 10, 20])]);
    const answer = await call(GET_PART, { params: { show: own.show.code, asset: 'post', part: 'shaft' }, token: own.people.artist.token });
    const detail = answer.json as unknown as PartDetail;
    expect(detail.settings.map((one) => [one.density_kg_m3, one.set_by, one.set_from])).toEqual([[600, own.people.lead.name, 'api'], [500, own.people.lead.name, 'api']]);
    expect(detail.versions.map((one) => [one.version, one.current, Number(one.volume_m3?.toFixed(9))])).toEqual([['v002', true, 0.002], ['v001', false, 0.001]]);
    expect(detail.row.mass_kg).toBeCloseTo(1.2, 12);
    expect(detail.measured_as).toMatchObject({ scheme: 'polyhedral', parts_by: 'group' });
  });

  test('an asset has its parts and its totals', async () => {
    const answer = await call(GET_ASSET, { params: { show: cast.show.code, asset: 'Zebra' }, token: cast.people.artist.token });
    const detail = answer.json as unknown as AssetDetail;
    expect(detail.parts.map((row) => row.part)).toEqual(['part_0', 'part_1_L', 'part_2', 'part_3_L', 'part_4']);
    expect(detail.total).toEqual((await list({ asset: 'Zebra' })).assets[0]);
  });

  test('what is not there is not found', async () => {
    const token = cast.people.artist.token;
    expectProblem(await call(GET_PART, { params: { show: cast.show.code, asset: 'apple', part: 'core' }, token }), 404, 'not_found');
    expectProblem(await call(GET_PART, { params: { show: cast.show.code, asset: 'pear', part: 'part_0' }, token }), 404, 'not_found');
    expectProblem(await call(GET_ASSET, { params: { show: cast.show.code, asset: 'pear' }, token }), 404, 'not_found');
  });
});

test('materials: the show’s own hides the studio’s of that name, and words find them', async () => {
  await asOwner(`insert into materials (show_id, name, category, density_kg_m3, source, from_memory) values (null, 'Bog Oak', 'wood', 800, 'elsewhere', true), (null, 'Water', 'fluid', 1000, 'elsewhere', true)`);
  const materials = async (query: Record<string, string> = {}) => {
    const answer = await call(GET_MATERIALS, { params: { show: cast.show.code }, query, token: cast.people.artist.token });
    return (answer.json as { items: { name: string; scope: string; density_kg_m3: number }[] }).items.map((one) => [one.name, one.scope, one.density_kg_m3]);
  };
  const all = await materials();
  expect(all).toContainEqual(['bog oak', 'show', 900]);
  expect(all).not.toContainEqual(['Bog Oak', 'studio', 800]);
  expect(all).toContainEqual(['Water', 'studio', 1000]);
  expect(await materials({ q: 'flu elsew' })).toEqual([['Water', 'studio', 1000]]);
  expect((await materials({ q: 'CLOTH' })).map(([name]) => name)).toContain('Felt');
});
