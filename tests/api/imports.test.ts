import { createHash } from 'node:crypto';
import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { describe, expect, test } from 'vitest';
import { GET as LIST, POST as OPEN } from '@/app/api/v1/shows/[show]/imports/route';
import { GET } from '@/app/api/v1/shows/[show]/imports/[import]/route';
import { POST as CANCEL } from '@/app/api/v1/shows/[show]/imports/[import]/cancel/route';
import { GET as EVENTS } from '@/app/api/v1/shows/[show]/imports/[import]/events/route';
import { GET as FAULTS } from '@/app/api/v1/shows/[show]/imports/[import]/faults/route';
import { PUT } from '@/app/api/v1/shows/[show]/imports/[import]/files/[...name]/route';
import { POST as PAUSE } from '@/app/api/v1/shows/[show]/imports/[import]/pause/route';
import { POST as RESUME } from '@/app/api/v1/shows/[show]/imports/[import]/resume/route';
import { POST as RETRY } from '@/app/api/v1/shows/[show]/imports/[import]/retry/route';
import { POST as SUBMIT } from '@/app/api/v1/shows/[show]/imports/[import]/submit/route';
import { config } from '@/lib/config';
import { database } from '@/db/client';
import { pauseImport } from '@/lib/imports/pause-import';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import type { ImportDetail } from '@/lib/rules/import-answer';
import { call, eachCaller, expectProblem, rowsOf, type StatusOfCaller } from '../support/api';
import { brokenObj, cubeObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, openWith, ownThread } from '../support/imports';

const TABLES = ['imports', 'import_files', 'blobs', 'shows', 'audit_events', 'audit_items'];
const writers = (status: number): StatusOfCaller => ({ admin: status, lead: status, td: status, artist: 403, guest: 404, outsider: 404, nobody: 401 });
const READERS: StatusOfCaller = { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 };

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');
const bring = (cast: Cast, files: Record<string, string>) => importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });
const openOne = (cast: Cast, files: Record<string, string> = {}) => openWith(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });

const post = (handler: typeof SUBMIT, cast: Cast, id: string) => call(handler, { method: 'POST', params: { show: cast.show.code, import: id }, token: cast.people.td.token });

function put(cast: Cast, id: string, name: string, text: string, extra: { query?: Record<string, string>; headers?: Record<string, string> } = {}) {
  return call(PUT, { method: 'PUT', params: { show: cast.show.code, import: id, name }, raw: text, token: cast.people.td.token, ...extra });
}

describe('who may do what', () => {
  eachCaller('opening', OPEN, writers(201), TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'POST', params: { show: cast.show.code }, body: {}, token: cast.tokenOf(caller) };
  });

  eachCaller('listing', LIST, READERS, TABLES, async (caller) => {
    const cast = await createCast();
    return { params: { show: cast.show.code }, token: cast.tokenOf(caller) };
  });

  eachCaller('putting a file', PUT, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'PUT', params: { show: cast.show.code, import: await openOne(cast), name: 'a/ox.obj' }, raw: cubeObj(), token: cast.tokenOf(caller) };
  });

  eachCaller('submitting', SUBMIT, writers(202), TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'POST', params: { show: cast.show.code, import: await openOne(cast, { 'ox.obj': cubeObj() }) }, token: cast.tokenOf(caller) };
  });

  eachCaller('reading', GET, READERS, TABLES, async (caller) => {
    const cast = await createCast();
    return { params: { show: cast.show.code, import: await openOne(cast) }, token: cast.tokenOf(caller) };
  });

  eachCaller('following', EVENTS, READERS, TABLES, async (caller) => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'ox.obj': cubeObj() });
    return { params: { show: cast.show.code, import: id }, token: cast.tokenOf(caller) };
  });

  eachCaller('retrying', RETRY, writers(202), TABLES, async (caller) => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'ox.obj': brokenObj });
    return { method: 'POST', params: { show: cast.show.code, import: id }, token: cast.tokenOf(caller) };
  });

  eachCaller('cancelling', CANCEL, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'POST', params: { show: cast.show.code, import: await openOne(cast) }, token: cast.tokenOf(caller) };
  });

  const submittedOne = async (cast: Cast) => {
    const id = await openOne(cast, { 'ox.obj': cubeObj() });
    await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    return id;
  };

  eachCaller('pausing', PAUSE, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    return { method: 'POST', params: { show: cast.show.code, import: await submittedOne(cast) }, token: cast.tokenOf(caller) };
  });

  eachCaller('reading what went wrong', FAULTS, READERS, TABLES, async (caller) => {
    const cast = await createCast();
    return { params: { show: cast.show.code, import: await submittedOne(cast) }, token: cast.tokenOf(caller) };
  });

  eachCaller('resuming', RESUME, writers(200), TABLES, async (caller) => {
    const cast = await createCast();
    const id = await submittedOne(cast);
    await pauseImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    return { method: 'POST', params: { show: cast.show.code, import: id }, token: cast.tokenOf(caller) };
  });

  test.each([['GET', GET], ['SUBMIT', SUBMIT], ['RETRY', RETRY], ['CANCEL', CANCEL], ['PAUSE', PAUSE], ['RESUME', RESUME], ['FAULTS', FAULTS]] as const)('%s of an import of another show is not found', async (_verb, handler) => {
    const [mine, other] = [await createCast(), await createCast()];
    const id = await openOne(other, { 'ox.obj': cubeObj() });
    const before = await rowsOf(...TABLES);
    const answer = await call(handler, { method: handler === GET || handler === FAULTS ? 'GET' : 'POST', params: { show: mine.show.code, import: id }, token: mine.people.lead.token });
    expectProblem(answer, 404, 'not_found');
    expect(await rowsOf(...TABLES)).toBe(before);
  });
});

describe('PUT a file', () => {
  test('answers the SHA-256 and keeps the bytes once', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const text = cubeObj({ size: 5 });
    const first = await put(cast, id, 'creatures/ox_v001.obj', text);
    expect(first.json).toEqual({ name: 'creatures/ox_v001.obj', sha256: sha256(text), bytes: text.length, stored: true });
    const before = await rowsOf(...TABLES);
    const again = await put(cast, id, 'creatures/ox_v001.obj', text);
    expect(again.json).toMatchObject({ sha256: sha256(text), stored: false });
    expect(await rowsOf(...TABLES)).toBe(before);
    await put(cast, id, 'other/name.obj', text);
    const folder = path.join(config().filesFolder, 'blobs', sha256(text).slice(0, 2));
    expect((await readdir(folder)).filter((name) => name === sha256(text))).toHaveLength(1);
  });

  test('other bytes under the name replace the first', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    await put(cast, id, 'ox.obj', cubeObj());
    const second = await put(cast, id, 'ox.obj', cubeObj({ size: 9 }));
    expect(second.json).toMatchObject({ stored: true });
    expect(await asOwner('select sha256 from import_files where import_id = $1', [id])).toEqual([{ sha256: sha256(cubeObj({ size: 9 })) }]);
  });

  test('bytes that are not those announced are refused and leave nothing', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const before = await rowsOf(...TABLES);
    const answer = await put(cast, id, 'ox.obj', cubeObj({ size: 6 }), { headers: { 'x-content-sha256': sha256('something else') } });
    expectProblem(answer, 422, 'bad_input', 'x-content-sha256');
    expect(await rowsOf(...TABLES)).toBe(before);
    expect(await readdir(path.join(config().filesFolder, 'uploads'))).toEqual([]);
  });

  test('an upload that breaks off leaves no temporary file and no row', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const before = await rowsOf(...TABLES);
    const body = new ReadableStream<Uint8Array>({
      start: (controller) => controller.enqueue(new TextEncoder().encode('v 0 0 0\n')),
      pull: (controller) => controller.error(new Error('the sender is gone')),
    });
    const answer = await call(PUT, { method: 'PUT', params: { show: cast.show.code, import: id, name: 'ox.obj' }, raw: body, token: cast.people.td.token });
    expectProblem(answer, 400, 'bad_request');
    expect(await rowsOf(...TABLES)).toBe(before);
    expect(await readdir(path.join(config().filesFolder, 'uploads'))).toEqual([]);
  });

  test.each([
    ['version', { version: 'twelve' }],
    ['asset', { asset: 'a/b' }],
    ['category', { category: 'animal' }],
  ])('a bad %s is refused by name', async (field, query) => {
    const cast = await createCast();
    const id = await openOne(cast);
    expectProblem(await put(cast, id, 'ox.obj', cubeObj(), { query }), 422, 'bad_input', field);
  });

  test('a path never leaves the import: its steps are names, not directions', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const answer = await put(cast, id, '../../etc/./ox.obj', cubeObj());
    expect(answer.json).toMatchObject({ name: 'etc/ox.obj' });
  });

  test('a submitted import takes no more', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'ox.obj': cubeObj() });
    const before = await rowsOf(...TABLES);
    expectProblem(await put(cast, id, 'late.obj', cubeObj()), 409, 'conflict');
    expect(await rowsOf(...TABLES)).toBe(before);
  });
});

describe('submit, retry, cancel', () => {
  const jobsOf = (id: string) => asOwner(`select id from pgboss.job where data ->> 'importId' = $1`, [id]);

  test('a second submit queues nothing again', async () => {
    const cast = await createCast();
    const id = await openOne(cast, { 'ox.obj': cubeObj() });
    expect((await post(SUBMIT, cast, id)).json).toMatchObject({ state: 'queued' });
    expect((await post(SUBMIT, cast, id)).status).toBe(202);
    expect(await jobsOf(id)).toHaveLength(1);
  });

  test('an import without files is not submitted', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    expectProblem(await post(SUBMIT, cast, id), 422, 'bad_input');
    expect(await asOwner('select state from imports where id = $1', [id])).toEqual([{ state: 'open' }]);
  });

  test('retry takes up the failures and leaves the rest', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'bad.obj': brokenObj, 'good.obj': cubeObj() });
    const good = () => asOwner(`select to_jsonb(f)::text as row from import_files f where import_id = $1 and name = 'good.obj'`, [id]);
    const before = await good();
    expect((await post(RETRY, cast, id)).json).toMatchObject({ state: 'queued', counts: { queued: 1, done: 1, failed: 0 } });
    expect(await good()).toEqual(before);
  });

  test('retry of a named file leaves the other failures', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'bad.obj': brokenObj, 'worse.obj': brokenObj, 'good.obj': cubeObj() });
    const answer = await call(RETRY, { params: { show: cast.show.code, import: id }, body: { files: ['bad.obj', 'good.obj'] }, token: cast.people.td.token });
    expect(answer.json).toMatchObject({ state: 'queued', counts: { queued: 1, done: 1, failed: 1 } });
    expect(await asOwner(`select name from import_files where import_id = $1 and state = 'queued'`, [id])).toEqual([{ name: 'bad.obj' }]);
  });

  test('a paused import keeps its state and waits, and goes on when it is resumed', async () => {
    const cast = await createCast();
    const id = await openOne(cast, { 'ox.obj': cubeObj() });
    expectProblem(await post(PAUSE, cast, id), 409, 'conflict');
    await post(SUBMIT, cast, id);
    expect((await post(PAUSE, cast, id)).json).toMatchObject({ state: 'queued', paused: true });
    expect((await post(PAUSE, cast, id)).json).toMatchObject({ paused: true });
    await drainQueue(database(), ownThread);
    const waiting = await call(GET, { params: { show: cast.show.code, import: id }, token: cast.people.td.token });
    expect(waiting.json).toMatchObject({ state: 'queued', paused: true, counts: { queued: 1 } });
    expect((await post(RESUME, cast, id)).json).toMatchObject({ state: 'queued', paused: false });
    expect((await post(RESUME, cast, id)).status).toBe(200);
    await drainQueue(database(), ownThread);
    expectProblem(await post(PAUSE, cast, id), 409, 'conflict');
    const acts = await asOwner(`select act from audit_events where show_id = $1 and act in ('pause-import', 'resume-import') order by id`, [cast.show.id]);
    expect(acts.map((act) => act.act)).toEqual(['pause-import', 'resume-import']);
    const done = await call(GET, { params: { show: cast.show.code, import: id }, token: cast.people.td.token });
    expect(done.json).toMatchObject({ state: 'done', paused: false, counts: { done: 1 } });
  });

  test('cancel fails what was not measured and refuses a done import', async () => {
    const cast = await createCast();
    const id = await openOne(cast, { 'ox.obj': cubeObj() });
    await post(SUBMIT, cast, id);
    const cancelled = await post(CANCEL, cast, id);
    expect(cancelled.json).toMatchObject({ state: 'cancelled', counts: { failed: 1 } });
    expect((await post(CANCEL, cast, id)).status).toBe(200);
    expectProblem(await post(SUBMIT, cast, id), 409, 'conflict');
    expectProblem(await post(RETRY, cast, id), 409, 'conflict');
    const { id: done } = await bring(cast, { 'ox.obj': cubeObj() });
    expectProblem(await post(CANCEL, cast, done), 409, 'conflict');
  });
});

describe('GET', () => {
  test('tells of each file as the contract says', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'bad.obj': brokenObj, 'creatures/ox_v003.obj': cubeObj() });
    const answer = await call(GET, { params: { show: cast.show.code, import: id }, token: cast.people.artist.token });
    expect(answer.json).toMatchObject({
      id,
      state: 'done',
      files: [
        { name: 'bad.obj', state: 'failed', asset: null, version: null, parts: null, problems: null, error: { code: expect.stringMatching(/^[a-z_]+$/), message: expect.stringMatching(/\S/), line: 10, column: 11 } },
        { name: 'creatures/ox_v003.obj', state: 'done', asset: 'ox', version: 'v003', parts: 1, problems: 0, error: null },
      ],
    });
  });

  test('a list is paged, newest first', async () => {
    const cast = await createCast();
    const ids = [await openOne(cast), await openOne(cast), await openOne(cast)];
    const page = (query: Record<string, string>) => call(LIST, { params: { show: cast.show.code }, query, token: cast.people.td.token });
    const first = (await page({ limit: '2' })).json as { items: { id: string }[]; next_cursor: string };
    const rest = (await page({ limit: '2', cursor: first.next_cursor })).json as { items: { id: string }[]; next_cursor: null };
    expect([...first.items, ...rest.items].map((item) => item.id)).toEqual(ids.reverse());
    expect(rest.next_cursor).toBeNull();
    expectProblem(await page({ cursor: 'now(); drop' }), 422, 'bad_input', 'cursor');
  });
});

describe('events', () => {
  const eventsOf = (text: string) => [...text.matchAll(/^id: (\d+)\nevent: import\ndata: (.*)$/gm)].map(([, id, data]) => ({ id, detail: JSON.parse(data) as ImportDetail }));
  const follow = (cast: Cast, id: string, headers = {}) => call(EVENTS, { params: { show: cast.show.code, import: id }, token: cast.people.td.token, headers });

  test('begin with the whole and end with the import', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'a.obj': cubeObj(), 'b.obj': brokenObj });
    const answer = await follow(cast, id);
    expect(answer.headers.get('content-type')).toContain('text/event-stream');
    expect(answer.headers.get('cache-control')).toContain('no-transform');
    const events = eventsOf(answer.text);
    expect(events).toHaveLength(1);
    expect(events[0].detail.files.map((file) => [file.name, file.state])).toEqual([['a.obj', 'done'], ['b.obj', 'failed']]);
  });

  test('tell what happens meanwhile, each change once', async () => {
    const cast = await createCast();
    const id = await openOne(cast, { 'a.obj': cubeObj() });
    const following = follow(cast, id);
    await new Promise((resolve) => setTimeout(resolve, 300));
    await call(SUBMIT, { method: 'POST', params: { show: cast.show.code, import: id }, token: cast.people.td.token });
    await call(CANCEL, { method: 'POST', params: { show: cast.show.code, import: id }, token: cast.people.td.token });
    const events = eventsOf((await following).text);
    expect(events.at(0)?.detail.state).toBe('open');
    expect(events.at(-1)?.detail).toMatchObject({ state: 'cancelled', files: [{ name: 'a.obj', state: 'failed' }] });
  });

  test('after a break tell what changed since', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'a.obj': cubeObj(), 'b.obj': brokenObj });
    const [{ id: last }] = eventsOf((await follow(cast, id)).text);
    await post(RETRY, cast, id);
    await post(CANCEL, cast, id);
    const [{ detail }] = eventsOf((await follow(cast, id, { 'last-event-id': last })).text);
    expect(detail.state).toBe('cancelled');
    expect(detail.files).toContainEqual(expect.objectContaining({ name: 'b.obj', error: expect.objectContaining({ code: 'cancelled' }) as object }) as object);
  });

  test.each(['nonsense', '-1', '999999999999999999'])('with %s as Last-Event-ID tell the whole', async (last) => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'a.obj': cubeObj() });
    expect(eventsOf((await follow(cast, id, { 'last-event-id': last })).text)[0].detail.files.map((file) => file.name)).toEqual(['a.obj']);
  });
});
