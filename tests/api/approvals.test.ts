import { describe, expect, test } from 'vitest';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { GET as outdated } from '@/app/api/v1/shows/[show]/outdated/route';
import { GET as list, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { POST as relock } from '@/app/api/v1/shows/[show]/relocks/route';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as unlock } from '@/app/api/v1/shows/[show]/shots/[shot]/unlocks/route';
import { POST as shots } from '@/app/api/v1/shows/[show]/shots/route';
import { POST as withdraw } from '@/app/api/v1/shows/[show]/withdrawals/route';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import type { PartPage, PartRow } from '@/lib/rules/part-row';
import { call, expectProblem, type Answer, type Handler } from '../support/api';
import { createCast, type Cast, type Person } from '../support/cast';
import { asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

/** A show in metres with a crate whose body weighs 24 kg, set by the td, in one shot of one sequence. */
async function createCrate(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
  await send(cast, 'td', PATCH, { items: [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 1 }] }, { method: 'PATCH' });
  expect((await send(cast, 'td', shots, { items: [{ code: 'fer_0010', sequence: 'fer', assets: ['crate'] }] })).status).toBe(201);
  return cast;
}

function send(cast: Cast, who: Person, handler: Handler, body: object, { method = 'POST', shot }: { method?: 'POST' | 'PATCH'; shot?: string } = {}): Promise<Answer> {
  return call(handler, { method, params: { show: cast.show.code, ...(shot ? { shot } : {}) }, body, token: cast.tokenOf(who) });
}

async function bodyRow(cast: Cast): Promise<PartRow> {
  const answer = await call(list, { params: { show: cast.show.code }, query: { asset: 'crate' }, token: cast.tokenOf('artist') });
  return (answer.json as unknown as PartPage).items.find((row) => row.part === 'body')!;
}

async function approveBody(cast: Cast): Promise<string> {
  const { value_sha256 } = await bodyRow(cast);
  const answer = await send(cast, 'lead', approve, { items: [{ asset: 'crate', part: 'body', value_sha256 }], note: 'weighed' });
  expect(answer.status, answer.text).toBe(201);
  return (answer.json as { items: { value_id: string }[] }).items[0].value_id;
}

const setDensity = async (cast: Cast, density: number) => send(cast, 'td', PATCH, { items: [{ asset: 'crate', part: 'body', revision: (await bodyRow(cast)).revision, density_kg_m3: density }] }, { method: 'PATCH' });
const csvOf = (cast: Cast, headers: Record<string, string> = {}) => call(exportCsv, { params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.tokenOf('artist'), headers });

describe('the way of a value', () => {
  test('approved, locked, changed, out of date, re-locked', async () => {
    const cast = await createCrate();
    const first = await approveBody(cast);
    expect(await bodyRow(cast)).toMatchObject({ state: 'approved', value_id: first });
    const locked = await send(cast, 'lead', lock, { items: [{ asset: 'crate', part: 'body', value_id: first }] }, { shot: 'fer_0010' });
    expect(locked.status, locked.text).toBe(201);
    const [{ lock: lockId }] = (locked.json as { items: { lock: string }[] }).items;
    const promised = await csvOf(cast);
    expect(promised.text.split('\r\n')).toHaveLength(3);

    await setDensity(cast, 2);
    expect(await bodyRow(cast)).toMatchObject({ state: 'outdated', value_id: null });
    expect((await csvOf(cast)).text).toBe(promised.text);
    expect((await csvOf(cast, { 'if-none-match': promised.headers.get('etag')! })).status).toBe(304);
    const stale = (await call(outdated, { params: { show: cast.show.code }, token: cast.tokenOf('artist') })).json as unknown as { items: OutdatedLock[] };
    expect(stale.items).toHaveLength(1);
    expect(stale.items[0]).toMatchObject({ lock: lockId, shot: 'fer_0010', asset: 'crate', part: 'body', why: 'changed', verdict: '+100 %', beyond_tolerance: true });

    expectProblem(await send(cast, 'lead', withdraw, { items: [{ value_id: first }], reason: 'wrong' }), 409, 'conflict');
    const second = await approveBody(cast);
    const moved = await send(cast, 'lead', relock, { items: [{ lock: lockId, value_id: second }], reason: 'heavier crate' });
    expect(moved.status, moved.text).toBe(201);
    expect((await csvOf(cast)).text).not.toBe(promised.text);
    expect((await send(cast, 'lead', withdraw, { items: [{ value_id: first }], reason: 'wrong' })).status).toBe(201);
    await setDensity(cast, 1);
    expect(await bodyRow(cast)).toMatchObject({ state: 'outdated', value_id: null });
    const [{ lock: now }] = (moved.json as { items: { lock: string }[] }).items;
    expect((await send(cast, 'lead', unlock, { items: [{ lock: now }], reason: 'not in the shot' }, { shot: 'fer_0010' })).status).toBe(200);
    expect((await csvOf(cast)).text.split('\r\n')).toHaveLength(2);
  });

  test('who set a value does not approve it, unless the show says so', async () => {
    const cast = await createCrate();
    await send(cast, 'lead', PATCH, { items: [{ asset: 'crate', part: 'body', revision: 2, density_kg_m3: 3 }] }, { method: 'PATCH' });
    const { value_sha256 } = await bodyRow(cast);
    const refused = expectProblem(await send(cast, 'lead', approve, { items: [{ asset: 'crate', part: 'body', value_sha256 }] }), 422, 'bad_input', 'items.0');
    expect(refused.errors).toMatchObject([{ index: 0, code: 'own_value' }]);
    expect((await send(cast, 'admin', approve, { items: [{ asset: 'crate', part: 'body', value_sha256 }] })).status).toBe(201);
  });

  test('another value than the one that was seen is refused with the row as it is', async () => {
    const cast = await createCrate();
    const { value_sha256 } = await bodyRow(cast);
    await setDensity(cast, 5);
    const refused = expectProblem(await send(cast, 'lead', approve, { items: [{ asset: 'crate', part: 'body', value_sha256 }] }), 409, 'conflict');
    expect(refused.errors).toMatchObject([{ code: 'changed_meanwhile', current: { density_kg_m3: 5 } }]);
  });
});

describe('a shot override', () => {
  const draft = (cast: Cast, who: Person, fields: object) => send(cast, who, PATCH, { items: [{ asset: 'crate', part: 'body', revision: 2, shot: 'fer_0010', ...fields }] }, { method: 'PATCH' });

  test('is drafted by an artist, approved by a lead, locked in its shot alone, and no version moves it', async () => {
    const cast = await createCrate();
    await send(cast, 'td', shots, { items: [{ code: 'fer_0020', sequence: 'fer', assets: ['crate'] }] });
    const drafted = await draft(cast, 'artist', { target_mass_kg: 99, reason: 'heavier for this one' });
    expect(drafted.status, drafted.text).toBe(200);
    expect(await bodyRow(cast)).toMatchObject({ state: 'measured', target_mass_kg: null, density_kg_m3: 1, revision: 2 });
    const [stored] = await asOwner<{ value_sha256: string; mass_kg: number }>('select value_sha256, mass_kg from shot_overrides where dropped_at is null and drafted_by = $1', [cast.people.artist.id]);
    expect(stored.mass_kg).toBeCloseTo(99, 12);

    const approved = await send(cast, 'lead', approve, { items: [{ asset: 'crate', part: 'body', value_sha256: stored.value_sha256, shot: 'fer_0010' }] });
    expect(approved.status, approved.text).toBe(201);
    const [{ value_id }] = (approved.json as { items: { value_id: string }[] }).items;
    expect(await bodyRow(cast)).toMatchObject({ state: 'measured', value_id: null });
    const elsewhere = expectProblem(await send(cast, 'lead', lock, { items: [{ asset: 'crate', part: 'body', value_id }] }, { shot: 'fer_0020' }), 422, 'bad_input');
    expect(elsewhere.detail).toMatch(/override of another shot/);
    expect((await send(cast, 'lead', lock, { items: [{ asset: 'crate', part: 'body', value_id }] }, { shot: 'fer_0010' })).status).toBe(201);
    const promised = await csvOf(cast);
    expect(promised.text).toMatch(/heavier for this one/);

    await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [4, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
    const stale = (await call(outdated, { params: { show: cast.show.code }, token: cast.tokenOf('artist') })).json as unknown as { items: OutdatedLock[] };
    expect(stale.items).toEqual([]);
    expect((await csvOf(cast)).text).toBe(promised.text);
  });

  test('needs a reason and a shot that is there', async () => {
    const cast = await createCrate();
    expectProblem(await draft(cast, 'artist', { target_mass_kg: 99 }), 422, 'bad_input', 'items.0.reason');
    expectProblem(await draft(cast, 'artist', { target_mass_kg: 99, reason: 'x', shot: 'nope' }), 422, 'bad_input', 'items.0.shot');
    expectProblem(await send(cast, 'artist', PATCH, { items: [{ asset: 'crate', part: 'body', revision: 2, density_kg_m3: 5 }] }, { method: 'PATCH' }), 403, 'forbidden');
  });
});
