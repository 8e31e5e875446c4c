import { describe, expect, test } from 'vitest';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { GET as compare } from '@/app/api/v1/shows/[show]/compare/route';
import { GET as list, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as shots } from '@/app/api/v1/shows/[show]/shots/route';
import type { ComparisonAnswer } from '@/lib/rules/comparison';
import type { PartPage, PartRow } from '@/lib/rules/part-row';
import { call, eachCaller, expectProblem, type Answer, type Handler } from '../support/api';
import { createCast, type Cast, type Person } from '../support/cast';
import { boxPart, putCage } from '../support/put-cage';

const send = (cast: Cast, who: Person, handler: Handler, body: object, method: 'POST' | 'PATCH' = 'POST', shot = ''): Promise<Answer> =>
  call(handler, { method, params: { show: cast.show.code, ...(shot ? { shot } : {}) }, body, token: cast.tokenOf(who) });

async function rowOf(cast: Cast, part: string): Promise<PartRow> {
  const answer = await call(list, { params: { show: cast.show.code }, token: cast.tokenOf('artist') });
  return (answer.json as unknown as PartPage).items.find((row) => row.part === part)!;
}

async function setDensity(cast: Cast, part: string, density: number): Promise<void> {
  const answer = await send(cast, 'td', PATCH, { items: [{ asset: 'crate', part, revision: (await rowOf(cast, part)).revision, density_kg_m3: density }] }, 'PATCH');
  expect(answer.status, answer.text).toBe(200);
}

async function compared(cast: Cast, query: Record<string, string>): Promise<ComparisonAnswer> {
  const answer = await call(compare, { params: { show: cast.show.code }, query, token: cast.tokenOf('artist') });
  expect(answer.status, answer.text).toBe(200);
  return answer.json as unknown as ComparisonAnswer;
}

/** A crate in metres: a body of 2 × 3 × 4 and a lid of 1 × 1 × 2, at 1 kg/m³; in v002 the body is 1 longer along z. */
async function createCrate(): Promise<{ cast: Cast; valueId: string }> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  const lid = boxPart('lid', [10, 0, 0], [11, 1, 2]);
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), lid]);
  await setDensity(cast, 'body', 1);
  await setDensity(cast, 'lid', 1);
  const { value_sha256 } = await rowOf(cast, 'body');
  const approved = await send(cast, 'lead', approve, { items: [{ asset: 'crate', part: 'body', value_sha256 }] });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 5]), lid]);
  return { cast, valueId: (approved.json as { items: { value_id: string }[] }).items[0].value_id };
}

describe('comparing', () => {
  eachCaller('compare', compare, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['approvals'], async (caller) => {
    const { cast } = await createCrate();
    return { params: { show: cast.show.code }, query: { asset: 'crate', part: 'body' }, token: cast.tokenOf(caller) };
  });

  // Cuboids: m = ρabc, centre at half of each edge, I about it m(b² + c²)/12.
  test('the current value stands against the last approval unless something else is named', async () => {
    const { cast } = await createCrate();
    const found = await compared(cast, { asset: 'crate', part: 'body' });
    expect(found).toMatchObject({ before: { ref: 'approved', version: 'v001', by: cast.people.lead.name }, after: { ref: 'current', version: 'v002' }, beyond_tolerance: true, versions: ['v002', 'v001'], parts: ['body', 'lid'] });
    expect(found.before.numbers?.mass_kg).toBeCloseTo(24, 10);
    expect(found.after.numbers?.mass_kg).toBeCloseTo(30, 10);
    expect(found.after.numbers?.ixx_kg_m2).toBeCloseTo((30 * (9 + 25)) / 12, 9);
    expect(found.after.volume_m3).toBeCloseTo(30, 10);
    expect(found.differences?.com_shift_m[2]).toBeCloseTo(0.5, 12);
    expect(found.size_m).toBeCloseTo(Math.sqrt(4 + 9 + 16), 12);
    expect(found.verdict).toMatch(/^\+25 %, 500 mm along \+z/);
  });

  test('an older version counts with what is set today, and says so', async () => {
    const { cast } = await createCrate();
    await setDensity(cast, 'body', 2);
    const found = await compared(cast, { asset: 'crate', part: 'body', a: 'v001', b: 'v002' });
    expect(found.before.numbers?.mass_kg).toBeCloseTo(48, 10);
    expect(found.before.about).toMatch(/what is set today/);
    expect(found.after.numbers?.mass_kg).toBeCloseTo(60, 10);
  });

  test('a lock stands for the value that was promised, whatever is set since', async () => {
    const { cast, valueId } = await createCrate();
    await send(cast, 'td', shots, { items: [{ code: 'fer_0010', sequence: 'fer', assets: ['crate'] }] });
    const locked = await send(cast, 'lead', lock, { items: [{ asset: 'crate', part: 'body', value_id: valueId }] }, 'POST', 'fer_0010');
    const [{ lock: id }] = (locked.json as { items: { lock: string }[] }).items;
    await setDensity(cast, 'body', 3);
    const found = await compared(cast, { lock: id });
    expect(found).toMatchObject({ asset: 'crate', part: 'body', lock: { id, shot: 'fer_0010', copy: null }, before: { ref: 'lock', version: 'v001' } });
    expect(found.before.numbers?.mass_kg).toBeCloseTo(24, 10);
    expect(found.after.numbers?.mass_kg).toBeCloseTo(90, 10);
  });

  test('an asset is its parts together', async () => {
    const { cast } = await createCrate();
    const found = await compared(cast, { asset: 'crate', a: 'v001', b: 'v002' });
    expect(found.part).toBeNull();
    expect(found.before.numbers?.mass_kg).toBeCloseTo(26, 10);
    expect(found.after.numbers?.mass_kg).toBeCloseTo(32, 10);
    expect(found.before.numbers?.com_x_m).toBeCloseTo((24 * 1 + 2 * 10.5) / 26, 12);
    expect(found.after.numbers?.bounds_m).toEqual([0, 0, 0, 11, 3, 5]);
  });

  test('a part that a version does not have has no value there', async () => {
    const { cast } = await createCrate();
    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 5])]);
    const found = await compared(cast, { asset: 'crate', part: 'lid', a: 'v002' });
    expect(found).toMatchObject({ after: { numbers: null, about: 'lid is not in v003.', volume_m3: null }, differences: null, beyond_tolerance: null });
  });

  test('what is not there is not found', async () => {
    const { cast } = await createCrate();
    const wrong = (query: Record<string, string>) => call(compare, { params: { show: cast.show.code }, query, token: cast.tokenOf('artist') });
    expectProblem(await wrong({}), 422, 'bad_input', 'asset');
    expectProblem(await wrong({ asset: 'raft' }), 404, 'not_found');
    expectProblem(await wrong({ asset: 'crate', part: 'oar' }), 404, 'not_found');
    expectProblem(await wrong({ asset: 'crate', a: 'v009' }), 404, 'not_found');
    expectProblem(await wrong({ lock: '00000000-0000-4000-8000-000000000000' }), 404, 'not_found');
  });
});
