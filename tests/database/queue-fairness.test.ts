import { beforeEach, expect, test } from 'vitest';
import { database } from '@/db/client';
import type { Seat } from '@/lib/imports/claim-turn';
import { TURN_BYTES } from '@/lib/imports/pick-files';
import { submitImport } from '@/lib/imports/submit-import';
import { importFilesHandler, type JobTools } from '@/lib/jobs/handlers/import-files';
import { expectedMeasureBytes } from '@/lib/jobs/measure-budget';
import { MemoryLedger } from '@/lib/jobs/memory-ledger';
import { cubeObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith, ownThread } from '../support/imports';

const GB = 1024 ** 3;
let cubes = 0;

/** Files say that they are so large, so that a turn is soon over. */
const FILE_BYTES = 1024 ** 2;
const TURN = TURN_BYTES / FILE_BYTES;

// A turn goes to whoever is next in the studio: what an earlier test left would be it.
beforeEach(() => asOwner(`update imports set paused_at = now() where state in ('queued', 'running')`).then(() => undefined));

const submit = (cast: Cast, id: string) => submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
const seatOf = (bytes: number, isRoomiest = true): Seat => ({ worker: 'north 1', memory: new MemoryLedger(bytes), isRoomiest });
const turn = (seat: Seat, engine: JobTools['engine'] = ownThread) => importFilesHandler({ db: database(), engine, seat }, { importId: '00000000-0000-4000-8000-000000000000' });

/** An import of so many files of equal bytes, each another asset, without the uploads that they would take. */
async function openMany(cast: Cast, files: number, name = 'crate'): Promise<string> {
  const id = await openWith(cast.contextOf('td'), cast.show.code, { [`${name}0_v001.obj`]: cubeObj({ size: 2 + ++cubes }) });
  await asOwner(
    `insert into import_files (import_id, name, sha256, byte_size)
      select import_id, $2 || n || '_v001.obj', sha256, byte_size from import_files, generate_series(1, $3::int) n where import_id = $1`,
    [id, name, files - 1],
  );
  await asOwner('update import_files set byte_size = $2 where import_id = $1', [id, FILE_BYTES]);
  return id;
}

const stateOf = async (id: string) => (await asOwner<{ state: string }>('select state from imports where id = $1', [id]))[0].state;
const endedOf = async (id: string) => (await asOwner<{ ended: number }>('select count(*)::int as ended from import_files where import_id = $1 and ended_at is not null', [id]))[0].ended;

test('a show of 5,000 files does not hold up three of another', async () => {
  const [big, small] = [await createCast(), await createCast()];
  const many = await openMany(big, 5_000);
  await submit(big, many);
  const seat = seatOf(8 * GB);
  await turn(seat);
  await turn(seat);
  expect(await endedOf(many)).toBe(2 * TURN);
  const few = await openMany(small, 3);
  await submit(small, few);
  await turn(seat);
  expect(await stateOf(few)).toBe('done');
  expect(await endedOf(many)).toBe(2 * TURN);
});

test('work goes round among shows: of three that wait none is served twice before the others', async () => {
  const casts = [await createCast(), await createCast(), await createCast()];
  const ids: string[] = [];
  for (const cast of casts) {
    const id = await openMany(cast, 3 * TURN);
    await submit(cast, id);
    ids.push(id);
  }
  const seat = seatOf(8 * GB);
  for (let round = 1; round <= 3; round++) {
    for (let n = 0; n < 3; n++) await turn(seat);
    expect(await Promise.all(ids.map(endedOf))).toEqual(Array(3).fill(round * TURN));
  }
});

test('a small import of a show is not behind a large one of the same show', async () => {
  const cast = await createCast();
  const many = await openMany(cast, 40, 'crate');
  await submit(cast, many);
  const seat = seatOf(8 * GB);
  await turn(seat);
  const few = await openMany(cast, 3, 'barrel');
  await submit(cast, few);
  await turn(seat);
  expect(await stateOf(few)).toBe('done');
});

/** An import of small files with one that says that it is so large. */
async function openWithHuge(cast: Cast, smallFiles: number, bytes: number): Promise<string> {
  const id = await openMany(cast, smallFiles);
  await asOwner(`insert into import_files (import_id, name, sha256, byte_size) select import_id, 'aaa_huge.obj', sha256, $2 from import_files where import_id = $1 limit 1`, [id, bytes]);
  return id;
}

test('a huge file waits for room while small ones go on, gets it before they are all through, and leaves them what it does not take', async () => {
  const cast = await createCast();
  const HUGE = 500 * 1024 ** 2;
  const id = await openWithHuge(cast, 40, HUGE);
  const need = expectedMeasureBytes({ name: 'aaa_huge.obj', byteSize: HUGE });
  const seat = seatOf(Math.ceil(need * 1.05));
  await submit(cast, id);
  // Somebody has a little too much in hand for the huge one to begin.
  seat.memory.hold('elsewhere', Math.ceil(need * 0.1));
  await turn(seat);
  const hugeState = async () => (await asOwner<{ state: string }>(`select state from import_files where import_id = $1 and name = 'aaa_huge.obj'`, [id]))[0].state;
  let turns = 1;
  for (; seat.memory.keptFor === null && turns < 30; turns++) await turn(seat);
  // It was passed over, and room is kept for it; the small ones went on meanwhile.
  expect(await hugeState()).toBe('queued');
  expect(await endedOf(id)).toBeGreaterThanOrEqual(TURN);
  expect(await stateOf(id)).toBe('running');
  seat.memory.hold('elsewhere', 0);
  await turn(seat);
  expect(await hugeState()).toBe('done');
  expect(await endedOf(id)).toBeLessThan(41);
  while ((await stateOf(id)) !== 'done') await turn(seat);
  expect(await endedOf(id)).toBe(41);
});

test('a file larger than any budget is left to the roomiest worker, which measures it with nothing beside it', async () => {
  const cast = await createCast();
  const id = await openWithHuge(cast, 1, 4 * GB);
  await submit(cast, id);
  const [cramped, roomy] = [seatOf(1 * GB, false), seatOf(2 * GB, true)];
  for (let n = 0; n < 3; n++) await turn(cramped);
  expect(await stateOf(id)).toBe('running');
  roomy.memory.hold('elsewhere', 1);
  for (let n = 0; n < 3; n++) await turn(roomy);
  expect(await stateOf(id)).toBe('running');
  roomy.memory.hold('elsewhere', 0);
  await turn(roomy);
  expect(await stateOf(id)).toBe('done');
});

test('a process never measures more at once than its budget, whatever its turns hold', async () => {
  const cast = await createCast();
  const FILES = 60;
  const id = await openMany(cast, FILES);
  const [{ sha256 }] = await asOwner<{ sha256: string }>('select sha256 from import_files where import_id = $1 limit 1', [id]);
  // Each with bytes of its own, or an equal measurement would spare the engine, and with sizes from nothing to two thirds of the budget.
  await asOwner(`insert into blobs (sha256, byte_size) select encode(sha256((id::text || 'x')::bytea), 'hex'), 1 from import_files where import_id = $1`, [id]);
  await asOwner(
    `update import_files f set sha256 = encode(sha256((f.id::text || 'x')::bytea), 'hex'), byte_size = 1000 + (n * 7919 % 65) * 1000000
      from (select id, row_number() over (order by name) n from import_files where import_id = $1) g where f.id = g.id`,
    [id],
  );
  const bytesOf = new Map((await asOwner<{ name: string; byte_size: string }>('select name, byte_size from import_files where import_id = $1', [id])).map((file) => [file.name, Number(file.byte_size)]));
  await submit(cast, id);
  const budget = Math.ceil(1.5 * Math.max(...[...bytesOf].map(([name, byteSize]) => expectedMeasureBytes({ name, byteSize }))));
  const seat = seatOf(budget);
  const measured: string[] = [];
  let inHand = 0;
  let most = 0;
  let together = 0;
  let running = 0;
  const engine: JobTools['engine'] = {
    async measure(file) {
      const bytes = expectedMeasureBytes({ name: file.name, byteSize: bytesOf.get(file.name)! });
      most = Math.max(most, (inHand += bytes));
      together = Math.max(together, ++running);
      measured.push(file.name);
      await new Promise((resolve) => setTimeout(resolve, 5));
      try {
        return await ownThread.measure({ ...file, sha256 });
      } finally {
        inHand -= bytes;
        running--;
      }
    },
  };
  for (let round = 0; round < 300 && (await stateOf(id)) !== 'done'; round++) await Promise.all([1, 2, 3, 4].map(() => turn(seat, engine)));
  expect(await stateOf(id)).toBe('done');
  expect(await asOwner('select message from file_faults f join import_files i on i.id = f.import_file_id where i.import_id = $1', [id])).toEqual([]);
  expect(most).toBeLessThanOrEqual(budget);
  expect(together).toBeGreaterThan(1);
  expect(new Set(measured).size).toBe(FILES);
  expect(measured).toHaveLength(FILES);
  expect(seat.memory.roomFor('any')).toBe(budget);
});
