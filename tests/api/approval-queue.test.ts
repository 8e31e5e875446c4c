import { describe, expect, test } from 'vitest';
import { POST as ask } from '@/app/api/v1/shows/[show]/approval-requests/route';
import { GET as queue, POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { GET as carryOver } from '@/app/api/v1/shows/[show]/carry-over/route';
import { GET as list, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as shots } from '@/app/api/v1/shows/[show]/shots/route';
import { POST as withdraw } from '@/app/api/v1/shows/[show]/withdrawals/route';
import { approvalItem, type CarryOverAnswer, type QueueFilter, type QueuePage, type QueueRow } from '@/lib/rules/approval-queue';
import type { PartPage } from '@/lib/rules/part-row';
import { call, eachCaller, expectProblem, type Answer, type Handler } from '../support/api';
import { createCast, type Cast, type Person } from '../support/cast';
import { boxPart, putCage } from '../support/put-cage';

function send(cast: Cast, who: Person, handler: Handler, body: object, { method = 'POST', shot }: { method?: 'POST' | 'PATCH'; shot?: string } = {}): Promise<Answer> {
  return call(handler, { method, params: { show: cast.show.code, ...(shot ? { shot } : {}) }, body, token: cast.tokenOf(who) });
}

async function read(cast: Cast, state: QueueFilter = 'waiting', { who = 'lead', limit, cursor }: { who?: Person; limit?: number; cursor?: string } = {}): Promise<QueuePage> {
  const query = { state, ...(limit ? { limit: String(limit) } : {}), ...(cursor ? { cursor } : {}) };
  const answer = await call(queue, { params: { show: cast.show.code }, query, token: cast.tokenOf(who) });
  expect(answer.status, answer.text).toBe(200);
  return answer.json as unknown as QueuePage;
}

const names = (rows: readonly QueueRow[]) => rows.map((row) => `${row.asset}/${row.part}${row.shot ? `@${row.shot}` : ''}`);

/** Sets densities, kg/m³, by the person. */
async function setDensities(cast: Cast, who: Person, densities: Record<string, number>): Promise<void> {
  const page = (await call(list, { params: { show: cast.show.code }, token: cast.tokenOf('artist') })).json as unknown as PartPage;
  const items = Object.entries(densities).map(([name, density]) => {
    const [asset, part] = name.split('/');
    return { asset, part, revision: page.items.find((row) => row.asset === asset && row.part === part)!.revision, density_kg_m3: density };
  });
  const answer = await send(cast, who, PATCH, { items }, { method: 'PATCH' });
  expect(answer.status, answer.text).toBe(200);
}

async function approveRows(cast: Cast, rows: readonly QueueRow[], more: object = {}): Promise<string[]> {
  const answer = await send(cast, 'lead', approve, { items: rows.map(approvalItem), ...more });
  expect(answer.status, answer.text).toBe(201);
  return (answer.json as { items: { value_id: string }[] }).items.map((item) => item.value_id);
}

/** A crate of body, lid and latch and a sledge of one part, in metres; all but the latch have a density, set by the td. */
async function createShow(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), boxPart('latch', [20, 0, 0], [21, 1, 1]), boxPart('lid', [10, 0, 0], [11, 1, 2])]);
  await putCage(cast.show, cast.people.td, 'sledge', [boxPart('bed', [0, 0, 0], [1, 2, 3])]);
  await setDensities(cast, 'td', { 'crate/body': 1, 'crate/lid': 1, 'sledge/bed': 1 });
  return cast;
}

describe('the queue', () => {
  eachCaller('queue', queue, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['part_current', 'approvals'], async (caller) => {
    const cast = await createShow();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  test('holds what has a value and no approval, what is asked for first, with its counts', async () => {
    const cast = await createShow();
    const before = await read(cast);
    expect(names(before.items)).toEqual(['crate/body', 'crate/lid', 'sledge/bed']);
    expect(before.counts).toEqual({ waiting: 3, asked: 0, outdated: 0, approved: 0 });
    const sledge = before.items[2];
    expect(sledge).toMatchObject({ verdict: 'first approval', state: 'measured', own: false, request: null, last: null, mass_kg: 6, locked_shots: [] });
    expect((await send(cast, 'td', ask, { items: [approvalItem(sledge), approvalItem(before.items[1])], note: 'for the lake shots' })).status).toBe(201);
    const after = await read(cast);
    expect(names(after.items)).toEqual(['crate/lid', 'crate/body', 'sledge/bed']);
    expect(after.items[0].request).toMatchObject({ note: 'for the lake shots', asked_by: cast.people.td.name, own: false, changed: false });
    expect(names((await read(cast, 'asked')).items)).toEqual(['crate/lid', 'sledge/bed']);
    expect((await read(cast, 'waiting', { who: 'td' })).items[0].request).toMatchObject({ own: true });
    await setDensities(cast, 'td', { 'sledge/bed': 2 });
    expect((await read(cast)).items[2].request).toMatchObject({ changed: true });
  });

  test('says what moved since the last approval, how many shots it is locked in, and what it was', async () => {
    const cast = await createShow();
    await send(cast, 'td', shots, { items: [{ code: 'fer_0010', sequence: 'fer', assets: ['sledge'] }, { code: 'fer_0020', sequence: 'fer', assets: ['sledge'] }] });
    const [value_id] = await approveRows(cast, (await read(cast)).items.slice(2), { note: 'as built' });
    for (const shot of ['fer_0010', 'fer_0020']) expect((await send(cast, 'lead', lock, { items: [{ asset: 'sledge', part: 'bed', value_id }] }, { shot })).status).toBe(201);
    await setDensities(cast, 'td', { 'sledge/bed': 1.09 });
    const page = await read(cast, 'outdated');
    expect(page.items).toHaveLength(1);
    expect(page.items[0]).toMatchObject({
      verdict: '+9 %', beyond_tolerance: true, locked_shots: ['fer_0010', 'fer_0020'], state: 'outdated', value_id: null,
      last: { value_id, approved_by: cast.people.lead.name, note: 'as built', mass_kg: 6, version: 'v001' }, setters: [cast.people.td.name],
    });
    expect(page.items[0].differences?.mass_change).toBeCloseTo(0.09, 12);
    expect(page.items[0].differences?.rotation_deg).toBe(0);
    const refused = expectProblem(await send(cast, 'lead', withdraw, { items: [{ value_id }], reason: 'wrong' }), 409, 'conflict');
    expect(refused.detail).toMatch(/fer_0010, fer_0020/);
  });

  test('tells the reader which values are their own, and why that does not matter where the show allows it', async () => {
    const cast = await createShow();
    await setDensities(cast, 'lead', { 'sledge/bed': 5 });
    const own = (who: Person) => read(cast, 'waiting', { who }).then((page) => page.items.map((row) => row.own));
    expect(await own('lead')).toEqual([false, false, true]);
    expect(await own('admin')).toEqual([false, false, false]);
    const free = await createCast({ linearUnit: 'm', scheme: 'polyhedral', selfApproval: true });
    await putCage(free.show, free.people.lead, 'sledge', [boxPart('bed', [0, 0, 0], [1, 2, 3])]);
    await setDensities(free, 'lead', { 'sledge/bed': 5 });
    expect((await read(free)).items[0].own).toBe(false);
  });

  test('an approved value leaves it and stands among the approved; taken back it waits again', async () => {
    const cast = await createShow();
    const [value_id] = await approveRows(cast, (await read(cast)).items.slice(0, 1));
    expect(names((await read(cast)).items)).toEqual(['crate/lid', 'sledge/bed']);
    const approved = await read(cast, 'approved');
    expect(approved.items).toMatchObject([{ part: 'body', value_id, verdict: 'as approved', state: 'approved' }]);
    expect(approved.counts).toEqual({ waiting: 2, asked: 0, outdated: 0, approved: 1 });
    expect((await send(cast, 'lead', withdraw, { items: [{ value_id }], reason: 'too early' })).status).toBe(201);
    expect((await read(cast)).items[0]).toMatchObject({ part: 'body', verdict: 'first approval' });
  });

  test('an override waits in its shot, under its own reason, until it is approved', async () => {
    const cast = await createShow();
    await send(cast, 'td', shots, { items: [{ code: 'mil_0020', sequence: 'mil', assets: ['sledge'] }] });
    const drafted = await send(cast, 'artist', PATCH, { items: [{ asset: 'sledge', part: 'bed', revision: 2, shot: 'mil_0020', target_mass_kg: 14, reason: 'laden' }] }, { method: 'PATCH' });
    expect(drafted.status, drafted.text).toBe(200);
    const { items, counts } = await read(cast);
    expect(names(items)).toEqual(['crate/body', 'crate/lid', 'sledge/bed', 'sledge/bed@mil_0020']);
    expect(counts?.waiting).toBe(4);
    expect(items[3]).toMatchObject({ shot: 'mil_0020', reason: 'laden', set_by: cast.people.artist.name, verdict: 'first approval', setters: [cast.people.artist.name] });
    expect(items[3].mass_kg).toBeCloseTo(14, 12);
    await approveRows(cast, [items[3]]);
    expect(names((await read(cast)).items)).toEqual(['crate/body', 'crate/lid', 'sledge/bed']);
    expect(names((await read(cast, 'approved')).items)).toEqual(['sledge/bed@mil_0020']);
  });

  test('pages lose and repeat nothing, in the same order as one long page', async () => {
    const cast = await createShow();
    const boxes = (from: number) => Array.from({ length: 7 }, (_, i) => boxPart(`p${i}`, [from, 10 * i, 0], [from + 1, 10 * i + 1, 1 + i]));
    await putCage(cast.show, cast.people.td, 'Raft', boxes(0));
    await putCage(cast.show, cast.people.td, 'arch', boxes(50));
    await setDensities(cast, 'td', Object.fromEntries(['Raft', 'arch'].flatMap((asset) => boxes(0).map((part) => [`${asset}/${part.name}`, 2]))));
    const whole = await read(cast);
    await send(cast, 'td', ask, { items: whole.items.filter((row) => row.part === 'p3' && row.asset === 'arch').map(approvalItem) });
    const { items: long } = await read(cast);
    expect(names(long)).toHaveLength(17);
    expect(names(long).slice(0, 2)).toEqual(['arch/p3', 'arch/p0']);
    for (const limit of [1, 2, 5, 16]) {
      const found: string[] = [];
      let cursor: string | null = null;
      do {
        const page: QueuePage = await read(cast, 'waiting', { limit, ...(cursor ? { cursor } : {}) });
        expect(page.counts === null).toBe(cursor !== null);
        found.push(...names(page.items));
        cursor = page.next_cursor;
      } while (cursor !== null);
      expect(found).toEqual(names(long));
    }
    const { next_cursor } = await read(cast, 'waiting', { limit: 2 });
    expectProblem(await call(queue, { params: { show: cast.show.code }, query: { state: 'approved', cursor: next_cursor! }, token: cast.tokenOf('lead') }), 422, 'bad_input', 'cursor');
    expectProblem(await call(queue, { params: { show: cast.show.code }, query: { state: 'mine' }, token: cast.tokenOf('lead') }), 422, 'bad_input', 'state');
  });
});

describe('carrying over', () => {
  eachCaller('carry over', carryOver, { admin: 200, lead: 200, td: 403, artist: 403, guest: 404, outsider: 404, nobody: 401 }, ['part_current', 'approvals'], async (caller) => {
    const cast = await createShow();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  test('takes what moved less than the tolerance, and neither what moved more nor the reader’s own', async () => {
    const cast = await createShow();
    await approveRows(cast, (await read(cast)).items);
    await setDensities(cast, 'td', { 'crate/body': 1.004, 'crate/lid': 1.2 });
    await setDensities(cast, 'lead', { 'sledge/bed': 1.001 });
    const answer = (await call(carryOver, { params: { show: cast.show.code }, token: cast.tokenOf('lead') })).json as unknown as CarryOverAnswer;
    expect(answer).toMatchObject({ items: [{ asset: 'crate', part: 'body', verdict: '+0.4 %' }], own: 1, beyond_tolerance: 1 });
    await approveRows(cast, answer.items as QueueRow[], { carry_over: true });
    expect(names((await read(cast, 'approved')).items)).toEqual(['crate/body']);
  });
});
