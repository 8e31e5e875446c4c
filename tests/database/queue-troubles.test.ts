import { describe, expect, test } from 'vitest';
import { database } from '@/db/client';
import type { Context } from '@/lib/context';
import { cancelImport } from '@/lib/imports/cancel-import';
import { getImport } from '@/lib/imports/get-import';
import { pauseImport } from '@/lib/imports/pause-import';
import { resumeImport } from '@/lib/imports/resume-import';
import { retryImport } from '@/lib/imports/retry-import';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import { getQueue } from '@/lib/jobs/get-queue';
import { importFilesHandler, type JobTools } from '@/lib/jobs/handlers/import-files';
import { MemoryFault } from '@/lib/jobs/passing-fault';
import { sweepLostFiles } from '@/lib/jobs/sweep-lost-files';
import { ownSeat } from '@/lib/jobs/worker-seat';
import { cubeObj } from '../support/cages';
import { createCast, type Cast, type Person } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith, ownThread } from '../support/imports';

let cubes = 0;
const newCube = () => cubeObj({ size: 3 + ++cubes });

async function submitted(cast: Cast, ...names: string[]): Promise<string> {
  const id = await openWith(cast.contextOf('td'), cast.show.code, Object.fromEntries(names.map((name) => [name, newCube()])), { scheme: 'polyhedral' });
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  return id;
}

const ref = (cast: Cast, id: string) => ({ show: cast.show.code, import: id });
const read = (cast: Cast, id: string) => getImport(cast.contextOf('td'), ref(cast, id));
const statesOf = async (cast: Cast, id: string) => (await read(cast, id)).files.map((file) => file.state);
const turn = (engine: JobTools['engine'] = ownThread) => importFilesHandler({ db: database(), engine, seat: ownSeat() }, { importId: '00000000-0000-4000-8000-000000000000' });
const versionsOf = (cast: Cast) => asOwner('select v.id from asset_versions v join assets a on a.id = v.asset_id where a.show_id = $1', [cast.show.id]);

/** Measures, but for the named file, with which it does something first. */
const meeting = (name: string, act: (signal: AbortSignal | undefined) => Promise<void>): JobTools['engine'] => ({
  async measure(file, _onMeasuring, signal) {
    if (file.name === name) await act(signal);
    return ownThread.measure(file);
  },
});

describe('pause and cancel', () => {
  test('a pause lets the file in hand end and leaves the rest, whose turns find nothing until it is resumed', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'a.obj', 'b.obj', 'c.obj');
    await turn(meeting('a.obj', async () => void (await pauseImport(cast.contextOf('td'), ref(cast, id)))));
    expect(await statesOf(cast, id)).toEqual(['done', 'queued', 'queued']);
    expect(await asOwner('select 1 from import_files where import_id = $1 and (lease_by is not null or attempts > 1)', [id])).toEqual([]);
    await drainQueue(database(), ownThread);
    await sweepLostFiles(database());
    await drainQueue(database(), ownThread);
    expect(await read(cast, id)).toMatchObject({ state: 'running', paused: true, counts: { done: 1, queued: 2 } });
    await resumeImport(cast.contextOf('td'), ref(cast, id));
    await drainQueue(database(), ownThread);
    expect(await statesOf(cast, id)).toEqual(['done', 'done', 'done']);
  });

  test('a cancel drops the file in hand: its measuring is told to stop, and nothing of it is kept', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'a.obj', 'b.obj');
    const dropped = meeting('a.obj', async (signal) => {
      await cancelImport(cast.contextOf('td'), ref(cast, id));
      await new Promise((resolve) => signal!.addEventListener('abort', resolve));
      throw new DOMException('This operation was aborted', 'AbortError');
    });
    await turn(dropped);
    expect((await read(cast, id)).files.map((file) => file.error?.code)).toEqual(['cancelled', 'cancelled']);
    expect(await versionsOf(cast)).toEqual([]);
    expect(await asOwner('select 1 from file_faults f join import_files i on i.id = f.import_file_id where i.import_id = $1', [id])).toEqual([]);
  });
});

describe('a disk that is full', () => {
  test('of the database in the middle of a version: nothing of it is there, the file is put off, and ends once there is room', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'ox_v001.obj');
    await asOwner(`create function refuse_for_test() returns trigger language plpgsql as $$ begin raise sqlstate '53100' using message = 'could not extend file: No space left on device'; end $$`);
    await asOwner(`create trigger refuse_for_test before insert on audit_items for each row execute function refuse_for_test()`);
    try {
      await turn();
    } finally {
      await asOwner(`drop trigger refuse_for_test on audit_items`);
    }
    expect((await read(cast, id)).files[0]).toMatchObject({ state: 'queued', trouble: { attempt: 1, message: 'A disk is full.' } });
    expect(await versionsOf(cast)).toEqual([]);
    expect(await asOwner('select 1 from assets where show_id = $1', [cast.show.id])).toEqual([]);
    await asOwner('update import_files set try_after = now() where import_id = $1', [id]);
    await turn();
    expect(await statesOf(cast, id)).toEqual(['done']);
    expect(await versionsOf(cast)).toHaveLength(1);
  });
});

describe('memory', () => {
  test('a file whose thread ran out of memory beside others is tried again with nothing beside it', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'a.obj');
    await turn(meeting('a.obj', () => Promise.reject(new MemoryFault())));
    expect((await read(cast, id)).files[0].trouble?.message).toMatch(/memory.*alone/);
    await asOwner('update import_files set try_after = now() where import_id = $1', [id]);
    const seat = ownSeat();
    let free = NaN;
    const engine = meeting('a.obj', async () => void (free = seat.memory.roomFor('another')));
    await importFilesHandler({ db: database(), engine, seat }, { importId: id });
    expect(free).toBe(0);
    expect(await statesOf(cast, id)).toEqual(['done']);
  });

  test('a file that its workers died with twice is alone at the third time, so that its neighbours live', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'a.obj');
    const die = (attempt: number) =>
      asOwner(`update import_files set state = 'measuring', attempts = $2, try_after = null, lease_by = gen_random_uuid(), lease_until = now() - interval '1 s' where import_id = $1`, [id, attempt]);
    const isAlone = async () => (await asOwner<{ is_alone: boolean }>('select is_alone from import_files where import_id = $1', [id]))[0].is_alone;
    await die(1);
    await sweepLostFiles(database());
    expect(await isAlone()).toBe(false);
    await die(2);
    await sweepLostFiles(database());
    expect(await isAlone()).toBe(true);
    await asOwner('update import_files set try_after = now() where import_id = $1', [id]);
    await turn();
    expect(await statesOf(cast, id)).toEqual(['done']);
  });
});

describe('the queue as admins see it', () => {
  test.each(['lead', 'td', 'artist', 'guest', 'outsider'] as Person[])('%s may not', async (person) => {
    const cast = await createCast();
    await expect(getQueue(cast.contextOf(person))).rejects.toMatchObject({ code: 'forbidden' });
  });

  test('nobody may not', async () => {
    const context: Context = { db: database(), actor: null, origin: 'hand', requestId: 'test' };
    await expect(getQueue(context)).rejects.toMatchObject({ code: 'not_signed_in' });
  });

  test('what waits, who works, what is put off and what was given up, with another try', async () => {
    const cast = await createCast();
    const admin = cast.contextOf('admin');
    const id = await submitted(cast, 'given_v001.obj', 'hand_v001.obj', 'off_v001.obj', 'wait_v001.obj');
    const named = (name: string, set: string) => asOwner(`update import_files set ${set} where import_id = $1 and name = $2`, [id, name]);
    await asOwner(`insert into workers (id, name, threads, memory_bytes) values (gen_random_uuid(), 'north-1', 2, 4000000000)`);
    await asOwner(`insert into workers (id, name, threads, memory_bytes, seen_at) values (gen_random_uuid(), 'south-1', 1, 2000000000, now() - interval '10 minutes')`);
    await named('hand_v001.obj', `state = 'measuring', attempts = 2, worker = 'north-1', started_at = now(), lease_by = gen_random_uuid(), lease_until = now() + interval '1 hour'`);
    await named('wait_v001.obj', `queued_at = now() - interval '90 s'`);
    await named('off_v001.obj', `attempts = 3, try_after = now() + interval '1 hour'`);
    await named('given_v001.obj', `attempts = 8, state = 'failed', error_code = 'gave_up', error_message = 'This file was begun 8 times and never came to an end.', ended_at = now()`);
    await asOwner(
      `insert into file_faults (import_file_id, attempt, worker, code, message) select id, attempts, 'north-1', 'storage', 'The file could not be read from storage (EIO).' from import_files where import_id = $1 and name in ('off_v001.obj', 'given_v001.obj')`,
      [id],
    );
    const mine = <T extends { show: string }>(items: readonly T[]) => items.filter((item) => item.show === cast.show.code);
    const state = await getQueue(admin);
    expect(state.oldest_waiting_s).toBeGreaterThanOrEqual(90);
    expect(mine(state.shows)).toMatchObject([{ files: 2, paused_files: 0 }]);
    expect(state.workers).toMatchObject([{ name: 'north-1', alive: true, files: [{ file: 'hand_v001.obj', show: cast.show.code, attempt: 2 }] }, { name: 'south-1', alive: false, files: [] }]);
    expect(mine(state.put_off)).toMatchObject([{ file: 'off_v001.obj', reason: 'The file could not be read from storage (EIO).', faults: [{ attempt: 3, worker: 'north-1' }] }]);
    expect(new Date(mine(state.put_off)[0].again_at!).getTime()).toBeGreaterThan(Date.now());
    expect(mine(state.given_up)).toMatchObject([{ file: 'given_v001.obj', reason: 'This file was begun 8 times and never came to an end.', again_at: null, faults: [{ attempt: 8 }] }]);
    await retryImport(admin, { ...ref(cast, id), files: ['given_v001.obj'] });
    expect(mine((await getQueue(admin)).given_up)).toEqual([]);
    await pauseImport(admin, ref(cast, id));
    expect(mine((await getQueue(admin)).shows)).toMatchObject([{ files: 0, paused_files: 3 }]);
  });

  test('a file that is wrong in itself is no matter of the queue', async () => {
    const cast = await createCast();
    const id = await submitted(cast, 'a.obj');
    await asOwner(`update import_files set state = 'failed', error_code = 'face_vertex_missing', error_message = 'x', ended_at = now() where import_id = $1`, [id]);
    expect((await getQueue(cast.contextOf('admin'))).given_up.filter((file) => file.show === cast.show.code)).toEqual([]);
  });
});
