import { beforeEach, expect, test } from 'vitest';
import { database } from '@/db/client';
import { cancelImport } from '@/lib/imports/cancel-import';
import { getImport } from '@/lib/imports/get-import';
import { listImportFaults } from '@/lib/imports/list-import-faults';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import type { JobTools } from '@/lib/jobs/handlers/import-files';
import { importFilesHandler } from '@/lib/jobs/handlers/import-files';
import type { ImportFilesJob } from '@/lib/jobs/registry';
import { ownSeat } from '@/lib/jobs/worker-seat';
import { ensureQueues, sendJobs } from '@/lib/jobs/send-jobs';
import { sweepLostFiles } from '@/lib/jobs/sweep-lost-files';
import { brokenObj, cubeObj, cubesObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith, ownThread } from '../support/imports';

let cubes = 0;

// A turn goes to whoever is next in the studio: what an earlier test left would be it.
beforeEach(() => asOwner(`update imports set paused_at = now() where state in ('queued', 'running')`).then(() => undefined));

/** A cube unlike every other: equal bytes would be spared the engine. */
const newCube = () => cubeObj({ size: 2 + ++cubes });

async function submitted(cast: Cast, files: Record<string, string>): Promise<string> {
  const id = await openWith(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  return id;
}

const read = (cast: Cast, id: string) => getImport(cast.contextOf('td'), { show: cast.show.code, import: id });
/** One turn of the queue, as a worker takes it. */
const turn = (engine: JobTools['engine'], id: string) => importFilesHandler({ db: database(), engine, seat: ownSeat() }, { importId: id });

/** Turns as they come, without the pauses between the tries, until the import is over. */
async function turnsUntilOver(cast: Cast, engine: JobTools['engine'], id: string): Promise<number> {
  for (let turns = 1; turns <= 50; turns++) {
    await asOwner('update import_files set try_after = now() where import_id = $1 and try_after is not null', [id]);
    await turn(engine, id);
    if ((await read(cast, id)).state === 'done') return turns;
  }
  throw new Error('The import did not come to its end in 50 turns.');
}

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

test('a passing fault puts the file off, stops no other, and is over with the next try', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'a.obj': newCube(), 'b.obj': newCube(), 'c.obj': newCube() });
  const engine = outOfReach('b.obj', 1);
  await turn(engine, id);
  const between = await read(cast, id);
  expect(between.state).toBe('running');
  expect(between.files.map((file) => file.state)).toEqual(['done', 'queued', 'done']);
  expect(between.files.map((file) => file.trouble?.message ?? null)).toEqual([null, 'The file could not be read from storage (EIO).', null]);
  // Its time has not come, however slow this machine is: a turn that comes too early leaves it alone.
  await asOwner(`update import_files set try_after = now() + interval '1 hour' where import_id = $1 and name = 'b.obj'`, [id]);
  await turn(engine, id);
  expect(engine.calls).toEqual(['a.obj', 'b.obj', 'c.obj']);
  await turnsUntilOver(cast, engine, id);
  expect(engine.calls).toEqual(['a.obj', 'b.obj', 'c.obj', 'b.obj']);
  expect((await read(cast, id)).files.map((file) => [file.state, file.trouble])).toEqual([['done', null], ['done', null], ['done', null]]);
});

test('a fault that never passes ends as a failure that says what it was, each try twice as late as the one before', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'a.obj': newCube() });
  const engine = outOfReach('a.obj', 100);
  await turnsUntilOver(cast, engine, id);
  const { files } = await read(cast, id);
  expect(files[0].error).toMatchObject({ code: 'gave_up', message: expect.stringMatching(/begun 8 times.* could not be read from storage \(EIO\)\. Reference [0-9a-f-]{36}/) });
  expect(engine.calls).toHaveLength(8);
  const faults = await asOwner<{ attempt: number; code: string; pause: number | null }>(
    `select attempt, code, extract(epoch from again_at - at)::float8 as pause from file_faults f join import_files i on i.id = f.import_file_id where i.import_id = $1 order by attempt`, [id]);
  expect(faults.map((fault) => fault.attempt)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
  expect(new Set(faults.map((fault) => fault.code))).toEqual(new Set(['storage']));
  expect(faults.map((fault) => fault.pause)).toEqual([2, 4, 8, 16, 32, 64, 128, null]);
  const { items } = await listImportFaults(cast.contextOf('td'), { show: cast.show.code, import: id });
  expect(items.map((fault) => [fault.name, fault.attempt, fault.again_at === null])).toEqual([1, 2, 3, 4, 5, 6, 7, 8].map((attempt) => ['a.obj', attempt, attempt === 8]));
});

test('a file put off takes those of its asset with it, so that its takes come out in order', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'ox/ox_v001.obj': newCube(), 'ox/ox_v002.obj': newCube(), 'ox/ox_v003.obj': newCube(), 'pig_v001.obj': newCube() });
  const engine = outOfReach('ox/ox_v001.obj', 1);
  await turn(engine, id);
  await asOwner(`update import_files set try_after = now() + interval '1 hour' where import_id = $1 and name = 'ox/ox_v001.obj'`, [id]);
  await turn(engine, id);
  expect(engine.calls).toEqual(['ox/ox_v001.obj', 'pig_v001.obj']);
  await turnsUntilOver(cast, engine, id);
  expect(engine.calls.slice(2)).toEqual(['ox/ox_v001.obj', 'ox/ox_v002.obj', 'ox/ox_v003.obj']);
});

test('a bad file is final at once and is not tried again', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'bad.obj': brokenObj });
  expect(await turnsUntilOver(cast, ownThread, id)).toBe(1);
  expect((await read(cast, id)).files[0].state).toBe('failed');
  expect(await asOwner('select attempts from import_files where import_id = $1', [id])).toEqual([{ attempts: 1 }]);
  expect(await asOwner('select 1 from file_faults f join import_files i on i.id = f.import_file_id where i.import_id = $1', [id])).toEqual([]);
});

test('more turns than there is work, taken by three workers at once, end each file once', async () => {
  const cast = await createCast();
  const names = Array.from({ length: 8 }, (_, n) => `part${n}_v001.obj`);
  const id = await submitted(cast, Object.fromEntries(names.map((name) => [name, newCube()])));
  const engine = outOfReach('', 0);
  await Promise.all(Array.from({ length: 9 }, () => turn(engine, id)));
  expect((await read(cast, id)).counts).toMatchObject({ done: 8, failed: 0 });
  expect(engine.calls.toSorted()).toEqual(names);
  expect(await asOwner('select v.id from asset_versions v join assets a on a.id = v.asset_id where a.show_id = $1', [cast.show.id])).toHaveLength(8);
});

test('imports that bring one asset at the same time number its versions in the order in which they were submitted', async () => {
  const cast = await createCast();
  const ids: string[] = [];
  for (let n = 0; n < 4; n++) ids.push(await submitted(cast, { 'ox.obj': newCube() }));
  while ((await Promise.all(ids.map((id) => read(cast, id)))).some((detail) => detail.state !== 'done')) await Promise.all(ids.map((id) => turn(ownThread, id)));
  const labels = (await Promise.all(ids.map((id) => read(cast, id)))).map((detail) => detail.files[0].version);
  expect(labels).toEqual(['v001', 'v002', 'v003', 'v004']);
});

test('equal bytes under two names are measured once', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'left.obj': cubesObj(['a', 'b'], 70), 'right.obj': cubesObj(['a', 'b'], 70) });
  const engine = outOfReach('', 0);
  await turn(engine, id);
  expect(engine.calls).toEqual(['left.obj']);
  expect((await read(cast, id)).files.map((file) => [file.asset, file.parts])).toEqual([['left', 2], ['right', 2]]);
});

test('a worker that lost its lease writes nothing over the one that has it', async () => {
  const cast = await createCast();
  const id = await submitted(cast, { 'ox.obj': newCube() });
  const other = '11111111-1111-4111-8111-111111111111';
  const engine: JobTools['engine'] = {
    measure: async (file) => {
      await asOwner(`update import_files set lease_by = $2, lease_until = now() + interval '1 hour' where import_id = $1`, [id, other]);
      return ownThread.measure(file);
    },
  };
  await turn(engine, id);
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
  await turn(engine, id);
  expect(await read(cast, id)).toMatchObject({ state: 'cancelled', files: [{ state: 'failed', error: { code: 'cancelled' } }] });
  expect(await asOwner('select id from assets where show_id = $1', [cast.show.id])).toEqual([]);
});

test('files whose turns are gone, and files whose worker fell silent, are taken up again; the others are left alone', async () => {
  const cast = await createCast();
  const gone = await submitted(cast, { 'gone.obj': newCube() });
  const silent = await submitted(cast, { 'silent.obj': newCube() });
  const untouched = await submitted(cast, { 'untouched.obj': newCube() });
  const held = await submitted(cast, { 'held.obj': newCube() });
  const lease = (id: string, state: string, until: string) =>
    asOwner(`update import_files set state = $3, attempts = 1, worker = 'north 1', lease_by = gen_random_uuid(), lease_until = now() + $2::interval where import_id = $1`, [id, until, state]);
  await asOwner(`delete from pgboss.job where name = 'import-files'`);
  await lease(silent, 'measuring', '-1 second');
  await lease(untouched, 'queued', '-1 second');
  await lease(held, 'measuring', '1 hour');
  expect(await sweepLostFiles(database())).toBe(2);
  expect(await sweepLostFiles(database())).toBe(0);
  await asOwner(`update import_files set try_after = now() + interval '1 hour' where import_id = $1`, [silent]);
  await drainQueue(database(), ownThread);
  const statesOf = async () => (await Promise.all([gone, silent, untouched, held].map((id) => read(cast, id)))).map((detail) => detail.files[0].state);
  expect(await statesOf()).toEqual(['done', 'queued', 'done', 'measuring']);
  // What was begun by the silent one has that in its history and is tried after a pause.
  expect((await read(cast, silent)).files[0].trouble).toMatchObject({ attempt: 1, message: 'The worker that measured it fell silent.' });
  await turnsUntilOver(cast, ownThread, silent);
  expect(await statesOf()).toEqual(['done', 'done', 'done', 'measuring']);
  await asOwner(`update import_files set lease_until = now() where import_id = $1`, [held]);
  await sweepLostFiles(database());
  await turnsUntilOver(cast, ownThread, held);
});

test('a transaction that fails leaves no job', async () => {
  await ensureQueues(database());
  const job: ImportFilesJob = { importId: '22222222-2222-4222-8222-222222222222' };
  const failing = database().transaction(async (tx) => {
    await sendJobs(tx, 'import-files', [job]);
    throw new Error('changed my mind');
  });
  await expect(failing).rejects.toThrow('changed my mind');
  expect(await asOwner(`select id from pgboss.job where data ->> 'importId' = $1`, [job.importId])).toEqual([]);
});
