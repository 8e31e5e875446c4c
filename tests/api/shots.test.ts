import { beforeAll, describe, expect, test } from 'vitest';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { POST as lockShots } from '@/app/api/v1/shows/[show]/lock-shots/route';
import { GET as listParts, PATCH } from '@/app/api/v1/shows/[show]/parts/route';
import { DELETE as takeOut } from '@/app/api/v1/shows/[show]/shots/[shot]/assets/[asset]/route';
import { GET as exportCsv } from '@/app/api/v1/shows/[show]/shots/[shot]/export.csv/route';
import { GET as getShot } from '@/app/api/v1/shows/[show]/shots/[shot]/route';
import { POST as unlock } from '@/app/api/v1/shows/[show]/shots/[shot]/unlocks/route';
import { GET as listShots, POST as putShots } from '@/app/api/v1/shows/[show]/shots/route';
import type { PartPage } from '@/lib/rules/part-row';
import type { ShotDetail, ShotEntry, ShotPage } from '@/lib/rules/shot-detail';
import { getSequence } from '@/lib/shots/get-sequence';
import { planShots } from '@/lib/shots/plan-shots';
import { call, eachCaller, expectProblem, type Answer, type Handler } from '../support/api';
import { createCast, type Cast, type Person } from '../support/cast';
import { boxPart, putCage } from '../support/put-cage';

const READERS = { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 };

function send(cast: Cast, who: Person, handler: Handler, body: object, { method = 'POST', params = {} }: { method?: 'POST' | 'PATCH' | 'DELETE'; params?: Record<string, string> } = {}): Promise<Answer> {
  return call(handler, { method, params: { show: cast.show.code, ...params }, body, token: cast.tokenOf(who) });
}

async function listed(cast: Cast, query: Record<string, string> = {}): Promise<ShotPage> {
  const answer = await call(listShots, { params: { show: cast.show.code }, query, token: cast.tokenOf('artist') });
  expect(answer.status, answer.text).toBe(200);
  return answer.json as unknown as ShotPage;
}

async function shotOf(cast: Cast, shot: string, who: Person = 'artist'): Promise<ShotDetail> {
  const answer = await call(getShot, { params: { show: cast.show.code, shot }, token: cast.tokenOf(who) });
  expect(answer.status, answer.text).toBe(200);
  return answer.json as unknown as ShotDetail;
}

const partsOf = async (cast: Cast) => ((await call(listParts, { params: { show: cast.show.code }, token: cast.tokenOf('artist') })).json as unknown as PartPage).items;

async function setDensity(cast: Cast, part: string, density: number): Promise<void> {
  const row = (await partsOf(cast)).find((one) => one.part === part)!;
  expect((await send(cast, 'td', PATCH, { items: [{ asset: row.asset, part, revision: row.revision, density_kg_m3: density }] }, { method: 'PATCH' })).status).toBe(200);
}

async function approveParts(cast: Cast, ...parts: string[]): Promise<void> {
  const items = (await partsOf(cast)).filter((row) => parts.includes(row.part!)).map((row) => ({ asset: row.asset, part: row.part, value_sha256: row.value_sha256 }));
  expect((await send(cast, 'lead', approve, { items })).status).toBe(201);
}

/** A crate of body and lid and a lamp of one part; the crate twice in fer_0010, the lamp in fer_0010 and fer_0020, nothing in mil_0010. */
async function createYard(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
  await putCage(cast.show, cast.people.td, 'lamp', [boxPart('glass', [0, 0, 0], [1, 1, 1])]);
  const items = [
    { code: 'fer_0020', sequence: 'fer', assets: ['lamp'] },
    { code: 'fer_0010', sequence: 'fer', title: 'The crates', assets: [{ asset: 'crate', copies: 2 }, 'lamp'] },
    { code: 'mil_0010', sequence: 'mil' },
  ];
  expect((await send(cast, 'td', putShots, { items })).status).toBe(201);
  await setDensity(cast, 'body', 1);
  await setDensity(cast, 'glass', 2);
  return cast;
}

const bare = ({ code, locked, missing, outdated, verdict }: ShotEntry) => ({ code, locked, missing, outdated, verdict });

describe('the list of shots', () => {
  let cast: Cast;
  beforeAll(async () => {
    cast = await createYard();
    await approveParts(cast, 'body', 'glass');
    expect((await send(cast, 'lead', lockShots, { sequence: 'fer' })).json).toMatchObject({ locked: 4 });
    await setDensity(cast, 'glass', 3);
  });

  eachCaller('the list', listShots, READERS, ['shots', 'shot_assets'], async (caller) => ({ params: { show: cast.show.code }, token: cast.tokenOf(caller) }));
  eachCaller('one shot', getShot, READERS, ['shots', 'shot_assets', 'locks'], async (caller) => ({ params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.tokenOf(caller) }));

  test('counts every copy of every part: locked, missing and out of date', async () => {
    const { items, next_cursor } = await listed(cast);
    expect(next_cursor).toBeNull();
    expect(items.map(bare)).toEqual([
      { code: 'fer_0010', locked: 3, missing: 2, outdated: 1, verdict: '2 missing, 1 out of date' },
      { code: 'fer_0020', locked: 1, missing: 0, outdated: 1, verdict: '1 out of date' },
      { code: 'mil_0010', locked: 0, missing: 0, outdated: 0, verdict: 'nothing in it' },
    ]);
    expect(items[0]).toMatchObject({ title: 'The crates', assets: [{ asset: 'crate', copies: 2 }, { asset: 'lamp', copies: 1 }] });
  });

  test('and one shot, its sequence and the parts table agree with it', async () => {
    const shot = await shotOf(cast, 'FER_0010');
    expect(shot).toMatchObject({ code: 'fer_0010', locked: 3, missing: 2, outdated: 1 });
    expect(shot.slots.map((slot) => [slot.asset, slot.copy, slot.part, slot.lock !== null, slot.outdated?.verdict ?? null])).toEqual([
      ['crate', null, 'body', true, null],
      ['crate', null, 'lid', false, null],
      ['crate', '2', 'body', true, null],
      ['crate', '2', 'lid', false, null],
      ['lamp', null, 'glass', true, '+50 %'],
    ]);
    const sequence = await getSequence(cast.contextOf('artist'), { show: cast.show.code, sequence: 'fer' });
    expect(sequence.assets).toEqual(['crate', 'lamp']);
    expect(sequence.shots[0].cells.crate).toMatchObject({ copies: 2, locked: 2, missing: 2, outdated: 0 });
    expect(sequence.outdated_locks.map((lock) => lock.shot)).toEqual(['fer_0010', 'fer_0020']);
    const glass = (await partsOf(cast)).find((row) => row.part === 'glass');
    expect(glass).toMatchObject({ locked_in: 2, outdated_in: 2 });
    expect((await partsOf(cast)).find((row) => row.part === 'lid')).toMatchObject({ locked_in: 0, outdated_in: 0 });
  });

  test.each([
    [{ state: 'missing' }, ['fer_0010']],
    [{ state: 'outdated' }, ['fer_0010', 'fer_0020']],
    [{ state: 'complete' }, []],
    [{ asset: 'crate' }, ['fer_0010']],
    [{ asset: 'lamp', state: 'missing' }, ['fer_0010']],
    [{ sequence: 'mil' }, ['mil_0010']],
    [{ q: 'CRATES fer' }, ['fer_0010']],
    [{ q: '%' }, []],
  ])('%o', async (query, codes) => {
    expect((await listed(cast, query as Record<string, string>)).items.map((item) => item.code)).toEqual(codes);
  });

  test('in pages holds every shot once, in order', async () => {
    for (const query of [{}, { state: 'outdated' }] as Record<string, string>[]) {
      const codes: string[] = [];
      for (let cursor: string | null = ''; cursor !== null; ) {
        const page: ShotPage = await listed(cast, { ...query, limit: '1', ...(cursor === '' ? {} : { cursor }) });
        codes.push(...page.items.map((item) => item.code));
        cursor = page.next_cursor;
      }
      expect(codes).toEqual((await listed(cast, query)).items.map((item) => item.code));
    }
  });

  test.each([
    [{ state: 'locked' }, 'state'],
    [{ limit: '0' }, 'limit'],
    [{ limit: '2000' }, 'limit'],
    [{ cursor: 'x' }, 'cursor'],
  ])('%o is refused by name', async (query, field) => {
    expectProblem(await call(listShots, { params: { show: cast.show.code }, query: query as Record<string, string>, token: cast.tokenOf('td') }), 422, 'bad_input', field);
  });
});

describe('who took a shot', () => {
  test('and what changed since the reader took it', async () => {
    const cast = await createYard();
    await approveParts(cast, 'body', 'glass');
    await send(cast, 'lead', lockShots, { shots: ['fer_0010'] });
    expect((await shotOf(cast, 'fer_0010')).since).toBeNull();
    const taken = await call(exportCsv, { params: { show: cast.show.code, shot: 'fer_0010' }, token: cast.tokenOf('artist') });
    const before = await shotOf(cast, 'fer_0010');
    expect(before.pulls).toMatchObject([{ taken_by: cast.people.artist.name, token: 'test', rows: 3, current: true }]);
    expect(`"${before.pulls[0].sha256}"`).toBe(taken.headers.get('etag'));
    expect(before.since).toMatchObject({ changes: [] });
    expect((await shotOf(cast, 'fer_0010', 'td')).since).toBeNull();

    const glass = before.slots.find((slot) => slot.part === 'glass')!;
    expect(glass.lock?.taken_by).toEqual([cast.people.artist.name]);
    await send(cast, 'lead', unlock, { items: [{ lock: glass.lock!.id }], reason: 'the lamp goes' }, { params: { shot: 'fer_0010' } });
    await setDensity(cast, 'lid', 4);
    await approveParts(cast, 'lid');
    await send(cast, 'lead', lockShots, { asset: 'crate' });
    const after = await shotOf(cast, 'fer_0010');
    expect(after.pulls).toMatchObject([{ current: false }]);
    expect(after.since?.changes.map(({ asset, copy, part, kind, reason }) => [asset, copy, part, kind, reason])).toEqual([
      ['crate', null, 'lid', 'added', null],
      ['crate', '2', 'lid', 'added', null],
      ['lamp', null, 'glass', 'ended', 'the lamp goes'],
    ]);
  });
});

describe('taking an asset out of a shot', () => {
  eachCaller('taking out', takeOut, { admin: 200, lead: 200, td: 200, artist: 403, guest: 404, outsider: 404, nobody: 401 }, ['shot_assets', 'audit_events'], async (caller) => {
    const cast = await createYard();
    return { method: 'DELETE', params: { show: cast.show.code, shot: 'fer_0010', asset: 'lamp' }, token: cast.tokenOf(caller) };
  });

  test('is refused while something of it is locked, copy by copy', async () => {
    const cast = await createYard();
    await approveParts(cast, 'glass', 'body');
    await send(cast, 'lead', lockShots, { shots: ['fer_0010'] });
    const out = (asset: string, copies?: number) => send(cast, 'td', takeOut, copies === undefined ? {} : { copies }, { method: 'DELETE', params: { shot: 'fer_0010', asset } });
    expectProblem(await out('lamp'), 409, 'conflict', 'asset');
    const second = (await shotOf(cast, 'fer_0010')).slots.find((slot) => slot.copy === '2' && slot.lock)!;
    expectProblem(await out('crate', 1), 409, 'conflict', 'asset');
    await send(cast, 'lead', unlock, { items: [{ lock: second.lock!.id }], reason: 'one crate is enough' }, { params: { shot: 'fer_0010' } });
    expect((await out('crate', 1)).json).toEqual({ asset: 'crate', removed: 1 });
    expect((await shotOf(cast, 'fer_0010')).assets).toEqual([{ asset: 'crate', copies: 1 }, { asset: 'lamp', copies: 1 }]);
    expectProblem(await out('sledge'), 404, 'not_found', 'asset');
  });
});

describe('a plan of shots', () => {
  test('says what would be made and what would be refused, and changes nothing', async () => {
    const cast = await createYard();
    const items = [
      { code: 'fer_0020', sequence: 'fer', assets: [{ asset: 'lamp', copies: 3 }, { asset: 'crate', copies: 1 }] },
      { code: 'fer_0030', sequence: 'fer', assets: [{ asset: 'lamp', copies: 1 }] },
      { code: 'mil_0010', sequence: 'bel', assets: [] },
      { code: 'bel_0010', sequence: 'bel', assets: [{ asset: 'anvil', copies: 1 }] },
    ];
    const plan = await planShots(cast.contextOf('td'), { show: cast.show.code, items });
    expect(plan.items.slice(0, 2)).toEqual([
      { code: 'fer_0020', sequence: 'fer', fresh: false, adds: [{ asset: 'lamp', copies: 2 }, { asset: 'crate', copies: 1 }] },
      { code: 'fer_0030', sequence: 'fer', fresh: true, adds: [{ asset: 'lamp', copies: 1 }] },
    ]);
    expect(plan.errors.map((error) => error.index)).toEqual([2, 3]);
    expect((await listed(cast)).items).toHaveLength(3);
  });
});
