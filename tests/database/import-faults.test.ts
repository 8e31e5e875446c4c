import { expect, test } from 'vitest';
import { database } from '@/db/client';
import { cancelImport } from '@/lib/imports/cancel-import';
import { getImport } from '@/lib/imports/get-import';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import type { JobTools } from '@/lib/jobs/handlers/import-files';
import { importFilesHandler } from '@/lib/jobs/handlers/import-files';
import type { ImportFilesJob } from '@/lib/jobs/registry';
import { ensureQueues, sendJobs } from '@/lib/jobs/send-jobs';
import { sweepLostFiles } from '@/lib/jobs/sweep-lost-files';
import { cubeObj, cubesObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith, ownThread } from '../support/imports';

let cubes = 0;

/** A cube unlike every other: equal bytes would be spared the engine. */
const newCube = () => cubeObj({ size: 2 + ++cubes });

async function submitted(cast: Cast, files: Record<string, string>): Promise<string> {
  const id = await openWith(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  return id;
}

const read = (cast: Cast, id: string) => getImport(cast.contextOf('td'), { show: cast.show.code, import: id });
const jobOf = async (id: string): Promise<ImportFilesJob> => (await asOwner<{ data: ImportFilesJob }>(`select data from pgboss.job where data ->> 'importId' = $1`, [id]))[0].data;

/** Fails as storage does when it is out of reach, for the named files, so often. */
function outOfReach(name: string, times: number): JobTools['engine'] & { calls: string[] } {
  let left = times;
  const calls: string[] = [];
  return {
    calls,
    measure: (file) => {
      calls.push(file.name);
      if (file.name !== name || left-- <= 0) return ownThread.measure(file);
      return Promise.reject(Object.assign(new Error('input/output error'), { code: 'EIO', syscall: 'read' }));
    },
  };
}

test('a passing fault gives the file back, stops no other, and is over with the next try', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'a.obj': newCube(), 'b.obj': newCube(), 'c.obj': newCube() });
  const job = await jobOf(id);
  const engine = outOfReach('b.obj', 1);
  await expect(importFilesHandler({ db: database(), engine }, job)).rejects.toThrow('input/output error');
  const between = await read(cast, id);
  expect(between.state).toBe('running');
  expect(between.files.map((file) => file.state)).toEqual(['done', 'queued', 'done']);
  await importFilesHandler({ db: database(), engine }, job);
  expect((await read(cast, id)).state).toBe('done');
  expect(engine.calls).toEqual(['a.obj', 'b.obj', 'c.obj', 'b.obj']);
});

test('a fault that never passes ends as a failure that says so, with a reference', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'a.obj': newCube() });
  const job = await jobOf(id);
  const engine = outOfReach('a.obj', 100);
  for (let turn = 0; turn < 5; turn++) await expect(importFilesHandler({ db: database(), engine }, job)).rejects.toThrow();
  await importFilesHandler({ db: database(), engine }, job);
  const { state, files } = await read(cast, id);
  expect(state).toBe('done');
  expect(files[0].error).toMatchObject({ code: 'gave_up', message: expect.stringMatching(/Reference [0-9a-f-]{36}/) });
});

test('one job taken up by three workers at once ends each file once', async () => {
  const cast = await createCast();
  const names = Array.from({ length: 8 }, (_, n) => `part${n}_v001.obj`);
  const id = await submitted(cast, Object.fromEntries(names.map((name) => [name, newCube()])));
  const job = await jobOf(id);
  const engine = outOfReach('', 0);
  await Promise.all([1, 2, 3].map(() => importFilesHandler({ db: database(), engine }, job)));
  expect((await read(cast, id)).counts).toMatchObject({ done: 8, failed: 0 });
  expect(engine.calls.toSorted()).toEqual(names);
  expect(await asOwner('select v.id from asset_versions v join assets a on a.id = v.asset_id where a.show_id = $1', [cast.show.id])).toHaveLength(8);
});

test('imports that bring one asset at the same time number its versions without a clash', async () => {
  const cast = await createCast();
  const ids = await Promise.all([1, 2, 3, 4].map(() => submitted(cast, { 'ox.obj': newCube() })));
  const jobs = await Promise.all(ids.map(jobOf));
  await Promise.all(jobs.map((job) => importFilesHandler({ db: database(), engine: ownThread }, job)));
  const labels = (await Promise.all(ids.map((id) => read(cast, id)))).map((detail) => detail.files[0].version);
  expect(labels.toSorted()).toEqual(['v001', 'v002', 'v003', 'v004']);
});

test('equal bytes under two names are measured once', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'left.obj': cubesObj(['a', 'b'], 70), 'right.obj': cubesObj(['a', 'b'], 70) });
  const engine = outOfReach('', 0);
  await importFilesHandler({ db: database(), engine }, await jobOf(id));
  expect(engine.calls).toEqual(['left.obj']);
  expect((await read(cast, id)).files.map((file) => [file.asset, file.parts])).toEqual([['left', 2], ['right', 2]]);
});

test('a worker that lost its lease writes nothing over the one that has it', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'ox.obj': newCube() });
  const job = await jobOf(id);
  const other = '11111111-1111-4111-8111-111111111111';
  const engine: JobTools['engine'] = {
    measure: async (file) => {
      await asOwner(`update import_files set lease_by = $2, lease_until = now() + interval '1 hour' where import_id = $1`, [id, other]);
      return ownThread.measure(file);
    },
  };
  await importFilesHandler({ db: database(), engine }, job);
  expect(await asOwner('select state, lease_by from import_files where import_id = $1', [id])).toEqual([{ state: expect.stringMatching(/reading|measuring/) as string, lease_by: other }]);
  expect(await asOwner('select id from assets where show_id = $1', [cast.show.id])).toEqual([]);
});

test('what is cancelled while it is measured makes no version', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'ox.obj': newCube() });
  const engine: JobTools['engine'] = {
    measure: async (file) => {
      await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: id });
      return ownThread.measure(file);
    },
  };
  await importFilesHandler({ db: database(), engine }, await jobOf(id));
  expect(await read(cast, id)).toMatchObject({ state: 'cancelled', files: [{ state: 'failed', error: { code: 'cancelled' } }] });
  expect(await asOwner('select id from assets where show_id = $1', [cast.show.id])).toEqual([]);
});

test('files whose job is gone, and files whose worker fell silent, are queued again; the others are left alone', async () => {
  const cast = await createCast();
  const gone = await submitted(cast, { 'gone.obj': newCube() });
  const silent = await submitted(cast, { 'silent.obj': newCube() });
  const held = await submitted(cast, { 'held.obj': newCube() });
  const waiting = await submitted(cast, { 'waiting.obj': newCube() });
  const lease = (id: string, until: string) => asOwner(`update import_files set state = 'measuring', lease_by = gen_random_uuid(), lease_until = now() + $2::interval where import_id = $1`, [id, until]);
  for (const id of [gone, silent, held]) await asOwner(`delete from pgboss.job where data ->> 'importId' = $1`, [id]);
  await lease(silent, '-1 second');
  await lease(held, '1 hour');
  expect(await sweepLostFiles(database())).toBe(2);
  expect(await sweepLostFiles(database())).toBe(0);
  await drainQueue(database(), ownThread);
  expect((await Promise.all([gone, silent, held, waiting].map((id) => read(cast, id)))).map((detail) => detail.files[0].state)).toEqual(['done', 'done', 'measuring', 'done']);
});

test('a transaction that fails leaves no job', async () => {
  await ensureQueues(database());
  const job: ImportFilesJob = { importId: '22222222-2222-4222-8222-222222222222', fileIds: ['33333333-3333-4333-8333-333333333333'] };
  const failing = database().transaction(async (tx) => {
    await sendJobs(tx, 'import-files', [job]);
    throw new Error('changed my mind');
  });
  await expect(failing).rejects.toThrow('changed my mind');
  expect(await asOwner(`select id from pgboss.job where data ->> 'importId' = $1`, [job.importId])).toEqual([]);
});
