import { setTimeout as wait } from 'node:timers/promises';
import { afterEach, expect, test } from 'vitest';
import { submitImport } from '@/lib/imports/submit-import';
import { gridBoxObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { openWith } from '../support/imports';
import { killWorkers, startWorkerProcess, type WorkerProcess } from '../support/worker-process';

afterEach(killWorkers);

const FILES = 16;

interface FileRow {
  name: string;
  state: string;
  attempts: number;
}

const filesOf = (id: string) => asOwner<FileRow>('select name, state, attempts from import_files where import_id = $1 order by name', [id]);

/** Waits for a count of ended files; fails with the worker's own words when it takes too long. */
async function waitForEnds(id: string, worker: WorkerProcess, wanted: number, seconds: number): Promise<void> {
  for (let turn = 0; turn < seconds * 20; turn++) {
    const [{ ended }] = await asOwner<{ ended: number }>(`select count(*)::int as ended from import_files where import_id = $1 and ended_at is not null`, [id]);
    if (ended >= wanted) return;
    await wait(50);
  }
  throw new Error(`${wanted} files had to end in ${seconds} s.\n${worker.output()}`);
}

async function submitBoxes(cast: Cast): Promise<string> {
  // Every file another size, so that none is spared by an equal measurement.
  const files = Object.fromEntries(Array.from({ length: FILES }, (_, n) => [`box${String(n).padStart(2, '0')}_v001.obj`, gridBoxObj(12, 10 + n)]));
  const id = await openWith(cast.contextOf('td'), cast.show.code, files);
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  return id;
}

async function expectEachOnce(cast: Cast, id: string): Promise<void> {
  const files = await filesOf(id);
  expect(files.map((file) => file.state)).toEqual(Array<string>(FILES).fill('done'));
  const versions = await asOwner(`select a.code, v.label from asset_versions v join assets a on a.id = v.asset_id where a.show_id = $1`, [cast.show.id]);
  expect(versions).toHaveLength(FILES);
  const acts = await asOwner(`select subject from audit_events where show_id = $1 and act = 'import-version'`, [cast.show.id]);
  expect(new Set(acts.map((act) => act.subject)).size).toBe(FILES);
  expect(acts).toHaveLength(FILES);
  expect(await asOwner('select state from imports where id = $1', [id])).toEqual([{ state: 'done' }]);
  expect(await asOwner('select part_id from part_current where show_id = $1', [cast.show.id])).toHaveLength(FILES);
}

test('a worker killed in the middle and started again: every file ends done once, none twice', { timeout: 300_000 }, async () => {
  const cast = await createCast();
  const id = await submitBoxes(cast);
  const first = startWorkerProcess();
  await waitForEnds(id, first, 3, 30);
  await first.end('SIGKILL');
  const left = (await filesOf(id)).filter((file) => file.state !== 'done');
  expect(left.length).toBeGreaterThan(0);
  const second = startWorkerProcess();
  await waitForEnds(id, second, FILES, 40);
  expect(await second.end('SIGTERM')).toBe(0);
  await expectEachOnce(cast, id);
});

test('a worker told to end gives back what it has not begun, and nothing is lost', { timeout: 300_000 }, async () => {
  const cast = await createCast();
  const id = await submitBoxes(cast);
  const first = startWorkerProcess();
  await waitForEnds(id, first, 3, 30);
  expect(await first.end('SIGTERM')).toBe(0);
  const held = await asOwner('select id from import_files where import_id = $1 and lease_by is not null', [id]);
  expect(held).toEqual([]);
  const second = startWorkerProcess();
  await waitForEnds(id, second, FILES, 40);
  await second.end('SIGTERM');
  await expectEachOnce(cast, id);
});
