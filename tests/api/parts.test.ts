import { describe, expect, test } from 'vitest';
import { GET, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import type { PartPage, PartRow } from '@/lib/rules/part-row';
import { call, eachCaller, expectProblem, rowsOf } from '../support/api';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

const VALUES = ['part_current', 'settings', 'audit_events', 'audit_items', 'shows'];

/** A show in metres with a cuboid 2 × 3 × 4 about (1, 1.5, 2) and a cube beside it. */
async function createBoxes(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
  return cast;
}

async function rowOf(cast: Cast, asset: string, part: string): Promise<PartRow> {
  const answer = await call(GET, { params: { show: cast.show.code }, query: { asset }, token: cast.people.artist.token });
  const row = (answer.json as unknown as PartPage).items.find((one) => one.part === part);
  if (!row) throw new Error(`no row ${asset}/${part}`);
  return row;
}

function patch(cast: Cast, items: object[], token: string | null = cast.people.td.token) {
  return call(PATCH, { method: 'PATCH', params: { show: cast.show.code }, body: { items }, token });
}

const itemsOf = (json: unknown): PartRow[] => (json as { items: PartRow[] }).items;

describe('who may', () => {
  eachCaller('list parts', GET, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, VALUES, async (caller) => {
    const cast = await createBoxes();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  eachCaller('set values', PATCH, { admin: 200, lead: 200, td: 200, artist: 403, guest: 404, outsider: 404, nobody: 401 }, VALUES, async (caller) => {
    const cast = await createBoxes();
    return { method: 'PATCH', params: { show: cast.show.code }, body: { items: [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }] }, token: cast.tokenOf(caller) };
  });
});

describe('setting values', () => {
  test('a density gives the cuboid of the handbooks: mass, centre, moments', async () => {
    const cast = await createBoxes();
    const answer = await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 1000 }]);
    expect(answer.status, answer.text).toBe(200);
    const [row] = itemsOf(answer.json);
    const mass = 24_000;
    expect(row).toMatchObject({ state: 'measured', mass_source: 'density', density_kg_m3: 1000, revision: 2, set_by: cast.people.td.name, set_from: 'api' });
    expect(row.mass_kg).toBeCloseTo(mass, 8);
    expect(row.volume_m3).toBeCloseTo(24, 12);
    expect(row.area_m2).toBeCloseTo(2 * (6 + 8 + 12), 12);
    expect([row.com_x_m, row.com_y_m, row.com_z_m].map((value) => Number(value?.toFixed(12)))).toEqual([1, 1.5, 2]);
    // m(b² + c²)/12, any handbook.
    expect(row.ixx_kg_m2! / ((mass * (9 + 16)) / 12)).toBeCloseTo(1, 12);
    expect(row.iyy_kg_m2! / ((mass * (4 + 16)) / 12)).toBeCloseTo(1, 12);
    expect(row.izz_kg_m2! / ((mass * (4 + 9)) / 12)).toBeCloseTo(1, 12);
    for (const product of [row.ixy_kg_m2, row.ixz_kg_m2, row.iyz_kg_m2]) expect(Math.abs(product!)).toBeLessThan(1e-9);
    expect([row.i1_kg_m2, row.i2_kg_m2, row.i3_kg_m2]).toEqual([row.i1_kg_m2, row.i2_kg_m2, row.i3_kg_m2].toSorted((a, b) => a! - b!));
  });

  test('a target mass wins and the density follows; a density then takes its place', async () => {
    const cast = await createBoxes();
    const [first] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, target_mass_kg: 48 }])).json);
    expect(first).toMatchObject({ mass_source: 'target_mass', target_mass_kg: 48 });
    expect(first.mass_kg).toBeCloseTo(48, 12);
    expect(first.density_kg_m3).toBeCloseTo(2, 12);
    const [second] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 2, density_kg_m3: 3 }])).json);
    expect(second).toMatchObject({ mass_source: 'density', target_mass_kg: null, density_kg_m3: 3 });
    expect(second.mass_kg).toBeCloseTo(72, 12);
    const [third] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 3, density_kg_m3: null }])).json);
    expect(third).toMatchObject({ state: 'unset', mass_kg: null, density_kg_m3: null, value_sha256: null, volume_m3: second.volume_m3 });
  });

  test('a sheet takes a weight per area, and its open border is then no problem', async () => {
    const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
    await putCage(cast.show, cast.people.td, 'tray', [boxPart('pan', [0, 0, 0], [1, 1, 1], true)]);
    const answer = await patch(cast, [{ asset: 'tray', part: 'pan', revision: 1, construction: 'sheet', areal_density_kg_m2: 2 }]);
    expect(answer.status, answer.text).toBe(200);
    const [row] = itemsOf(answer.json);
    expect(row).toMatchObject({ state: 'measured', construction: 'sheet', mass_source: 'areal_density', volume_m3: null });
    expect(row.mass_kg).toBeCloseTo(10, 12);
    // Five unit squares: the bottom's centre at height 0, four sides' at ½.
    expect(row.com_z_m).toBeCloseTo(0.4, 12);
    expect(row.problems.filter((one) => one.severity === 'problem')).toEqual([]);
  });

  test('a hollow part without a wall has no mass and says why', async () => {
    const cast = await createBoxes();
    const [row] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, construction: 'hollow', density_kg_m3: 700 }])).json);
    expect(row).toMatchObject({ state: 'unset', mass_kg: null, warnings: 'wall_missing' });
    expect(row.problems.map((one) => one.code)).toContain('wall_missing');
  });

  test('a hollow part weighs its wall, in whose corners its error lies', async () => {
    const cast = await createBoxes();
    const [solid] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }])).json);
    const [row] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 2, construction: 'hollow', density_kg_m3: 700, wall_m: 0.01 }])).json);
    expect(row).toMatchObject({ state: 'measured', construction: 'hollow', wall_m: 0.01, mass_source: 'density', volume_m3: solid.volume_m3 });
    // The box less the one inside it, each side of which is two walls shorter.
    const sides = [row.com_x_m, row.com_y_m, row.com_z_m].map((half) => 2 * half!);
    const wall = sides[0] * sides[1] * sides[2] - (sides[0] - 0.02) * (sides[1] - 0.02) * (sides[2] - 0.02);
    expect(Math.abs(row.mass_kg! / (700 * wall) - 1)).toBeLessThanOrEqual(row.numeric_error!);
    expect(row.numeric_error).toBeLessThan(0.01);
  });

  test('left out: no value, no total; taken in again it is as before', async () => {
    const cast = await createBoxes();
    const [before] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }])).json);
    const [out] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 2, left_out: true }])).json);
    expect(out).toMatchObject({ state: 'left_out', mass_kg: null, value_sha256: null });
    const [back] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'body', revision: 3, left_out: false }])).json);
    expect(back).toMatchObject({ state: 'measured', mass_kg: before.mass_kg, value_sha256: before.value_sha256 });
  });

  test('equal values write nothing', async () => {
    const cast = await createBoxes();
    await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }]);
    const before = await rowsOf(...VALUES);
    const answer = await patch(cast, [{ asset: 'crate', part: 'body', revision: 2, density_kg_m3: 700, construction: 'solid' }]);
    expect(answer.status).toBe(200);
    expect(itemsOf(answer.json)[0].revision).toBe(2);
    expect(await rowsOf(...VALUES)).toBe(before);
  });

  test('the history tells what was before and after', async () => {
    const cast = await createBoxes();
    await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }]);
    await patch(cast, [{ asset: 'crate', part: 'body', revision: 2, target_mass_kg: 12.5 }]);
    const rows = await asOwner(
      `select e.act, e.subject, e.origin, e.actor_id, i.field, i.before, i.after from audit_events e join audit_items i on i.event_id = e.id
       where e.show_id = $1 order by e.id, i.field`,
      [cast.show.id],
    );
    const act = { act: 'set-values', subject: 'crate/body', origin: 'api', actor_id: cast.people.td.id };
    expect(rows).toEqual([
      { ...act, field: 'density_kg_m3', before: null, after: '700' },
      { ...act, field: 'density_kg_m3', before: '700', after: null },
      { ...act, field: 'target_mass_kg', before: null, after: '12.5' },
    ]);
  });

  test('a material of the show comes before the studio’s of that name', async () => {
    const cast = await createBoxes();
    const insert = `insert into materials (show_id, name, category, density_kg_m3, source, from_memory) values ($1, $2, 'wood', $3, 'invented', true)`;
    await asOwner(insert, [null, 'Bog Oak', 800]);
    await asOwner(insert, [cast.show.id, 'bog oak', 900]);
    const [row] = itemsOf((await patch(cast, [{ asset: 'crate', part: 'lid', revision: 1, material: 'BOG OAK' }])).json);
    expect(row).toMatchObject({ material: 'bog oak', density_kg_m3: 900, mass_source: 'material' });
    expect(row.mass_kg).toBeCloseTo(900, 10);
  });
});

describe('what is refused changes nothing', () => {
  test.each([
    ['an unknown part', { asset: 'crate', part: 'no such', revision: 1, density_kg_m3: 1 }, 'not_found', 'part'],
    ['an unknown material', { asset: 'crate', part: 'lid', revision: 1, material: 'unobtainable' }, 'not_found', 'material'],
    ['a density of zero', { asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 0 }, 'bad_input', 'density_kg_m3'],
    ['a negative mass', { asset: 'crate', part: 'lid', revision: 1, target_mass_kg: -1 }, 'bad_input', 'target_mass_kg'],
    ['an unknown field', { asset: 'crate', part: 'lid', revision: 1, mass_kg: 1 }, 'bad_input', ''],
    ['a rigid body', { asset: 'crate', body: 'rb', revision: 1, density_kg_m3: 1 }, 'not_available', 'body'],
    ['an override of a shot that is not there', { asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 1, shot: 'fer_0010', reason: 'light' }, 'not_found', 'shot'],
    ['a part named twice', { asset: 'crate', part: 'body', revision: 1, density_kg_m3: 1 }, 'bad_input', 'part'],
  ])('%s', async (_, item, code, field) => {
    const cast = await createBoxes();
    const before = await rowsOf(...VALUES);
    const answer = await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }, item]);
    const problem = expectProblem(answer, 422, 'bad_input');
    const [error] = problem.errors as { index: number; code: string; field?: string }[];
    expect(error.index).toBe(1);
    expect(error.code).toBe(code);
    expect(error.field ?? '').toBe(field);
    expect(await rowsOf(...VALUES)).toBe(before);
  });

  test('two people on one row: the second is told who changed it, and sees the row as it is', async () => {
    const cast = await createBoxes();
    await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }], cast.people.lead.token);
    const before = await rowsOf(...VALUES);
    const answer = await patch(cast, [
      { asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 500 },
      { asset: 'crate', part: 'body', revision: 1, density_kg_m3: 500 },
    ]);
    const problem = expectProblem(answer, 409, 'conflict');
    const errors = problem.errors as { index: number; asset: string; part: string; code: string; message: string; current: PartRow }[];
    expect(errors).toHaveLength(1);
    expect(errors[0]).toMatchObject({ index: 1, asset: 'crate', part: 'body', code: 'changed_meanwhile' });
    expect(errors[0].message).toContain(cast.people.lead.name);
    expect(errors[0].current).toMatchObject({ density_kg_m3: 700, revision: 2 });
    expect(await rowsOf(...VALUES)).toBe(before);
  });

  test('of many who write one row at once, one wins', async () => {
    const cast = await createBoxes();
    const answers = await Promise.all(
      [1, 2, 3, 4, 5, 6].map((density) => patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: density }], density % 2 ? cast.people.td.token : cast.people.lead.token)),
    );
    expect(answers.map((one) => one.status).toSorted()).toEqual([200, 409, 409, 409, 409, 409]);
    expect(await asOwner('select 1 from settings s join parts p on p.id = s.part_id join assets a on a.id = p.asset_id where a.show_id = $1', [cast.show.id])).toHaveLength(1);
    expect((await rowOf(cast, 'crate', 'body')).revision).toBe(2);
  });

  test('an archived show is only read', async () => {
    const cast = await createBoxes();
    await asOwner('update shows set archived_at = now() where id = $1', [cast.show.id]);
    const before = await rowsOf(...VALUES);
    expectProblem(await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }]), 409, 'frozen');
    expect(await rowsOf(...VALUES)).toBe(before);
  });
});

describe('a new version', () => {
  test('keeps a density, keeps a target mass over it, and takes parts away that it no longer has', async () => {
    const cast = await createBoxes();
    await patch(cast, [
      { asset: 'crate', part: 'body', revision: 1, density_kg_m3: 10 },
      { asset: 'crate', part: 'lid', revision: 1, target_mass_kg: 5 },
    ]);
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 2]), boxPart('lid', [10, 0, 0], [12, 1, 1]), boxPart('new', [20, 0, 0], [21, 1, 1])]);
    const body = await rowOf(cast, 'crate', 'body');
    expect(body).toMatchObject({ version: 'v002', density_kg_m3: 10, revision: 3 });
    expect(body.mass_kg).toBeCloseTo(120, 10);
    const lid = await rowOf(cast, 'crate', 'lid');
    expect(lid.mass_kg).toBeCloseTo(5, 12);
    expect(lid.density_kg_m3).toBeCloseTo(2.5, 12);
    expect(await rowOf(cast, 'crate', 'new')).toMatchObject({ state: 'unset', revision: 1 });

    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 2])]);
    await expect(rowOf(cast, 'crate', 'lid')).rejects.toThrow('no row');
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 2]), boxPart('lid', [10, 0, 0], [12, 1, 1])]);
    expect(await rowOf(cast, 'crate', 'lid')).toMatchObject({ target_mass_kg: 5, mass_source: 'target_mass' });
  });

  test('an older one that arrives late changes nothing', async () => {
    const cast = await createBoxes();
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [1, 1, 1])], { version: 7 });
    const before = await rowsOf('part_current', 'shows');
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [9, 9, 9])], { version: 3 });
    expect(await rowsOf('part_current', 'shows')).toBe(before);
  });

  test('somebody who edits across it is told of the version', async () => {
    const cast = await createBoxes();
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 2])]);
    const problem = expectProblem(await patch(cast, [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }]), 409, 'conflict');
    expect((problem.errors as { message: string }[])[0].message).toContain('v002');
  });
});

test('scale acts on the geometry alone: mass by s³ and inertia by s⁵ at one density', async () => {
  const cast = await createCast({ linearUnit: 'cm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'plain', [boxPart('b', [0, 0, 0], [20, 30, 40])]);
  await putCage(cast.show, cast.people.td, 'giant', [boxPart('b', [0, 0, 0], [20, 30, 40])], { scale: 3 });
  const answer = await patch(cast, ['plain', 'giant'].map((asset) => ({ asset, part: 'b', revision: 1, density_kg_m3: 1000 })));
  const [plain, giant] = itemsOf(answer.json);
  expect(plain.mass_kg).toBeCloseTo(24, 12);
  expect(giant.mass_kg! / plain.mass_kg!).toBeCloseTo(27, 10);
  expect(giant.i2_kg_m2! / plain.i2_kg_m2!).toBeCloseTo(243, 8);
  expect(giant.com_z_m! / plain.com_z_m!).toBeCloseTo(3, 12);
});
