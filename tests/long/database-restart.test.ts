import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { sql } from 'drizzle-orm';
import { afterAll, expect, test } from 'vitest';
import { gridBoxObj } from '../support/cages';
import { makeDatabase, removeOwnCluster, startOwnCluster, stopOwnCluster } from '../support/own-cluster';
import { startSmtp } from '../support/smtp';
import { killWorkers, startWorkerProcess } from '../support/worker-process';

// A cluster of this test's own, since it is stopped in the middle; the product is pointed at it before its modules are loaded.
const folder = mkdtempSync(path.join(os.tmpdir(), 'weighhouse-restart-'));
const cluster = path.join(folder, 'cluster');
const { ownerUrl, appUrl } = await makeDatabase(await startOwnCluster(cluster), 'restarted');
const smtp = await startSmtp();
// Every import counts as a long one, so that its end is written about.
Object.assign(process.env, { DATABASE_URL: ownerUrl, WEIGHHOUSE_APP_DATABASE_URL: appUrl, SMTP_URL: smtp.url, MAIL_FROM: 'weighhouse@oxbarrow.example', WEIGHHOUSE_LONG_IMPORT_MINUTES: '0' });
const { database, closeDatabase } = await import('@/db/client');
const { submitImport } = await import('@/lib/imports/submit-import');
const { createCast } = await import('../support/cast');
const { openWith } = await import('../support/imports');

afterAll(async () => {
  killWorkers();
  await closeDatabase();
  await smtp.close();
  await removeOwnCluster(cluster);
  rmSync(folder, { recursive: true, force: true });
});

const FILES = 40;

const count = async (query: ReturnType<typeof sql>): Promise<number> => Number((await database().execute<{ n: string }>(query)).rows[0].n);

test('the database is restarted in the middle, at once and after a while: the same workers go on by themselves, nothing is lost and nothing is there or told twice', { timeout: 900_000 }, async () => {
  const cast = await createCast();
  const files = Object.fromEntries(Array.from({ length: FILES }, (_, n) => [`box${n}_v001.obj`, gridBoxObj(12, 2 + n / 3)]));
  const id = await openWith(cast.contextOf('td'), cast.show.code, files);
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  const workers = [startWorkerProcess(), startWorkerProcess()];
  const ended = () => count(sql`select count(*) as n from import_files where import_id = ${id} and ended_at is not null`);
  const untilEnded = async (wanted: number) => {
    for (let turns = 0; turns < 4_000; turns++) {
      if ((await ended().catch(() => 0)) >= wanted) return;
      await wait(100);
    }
    throw new Error(`${wanted} files had to end.\n${workers.map((worker) => worker.output()).join('\n')}`);
  };
  for (const [after, awayMs] of [[6, 0], [20, 12_000]] as const) {
    await untilEnded(after);
    await stopOwnCluster(cluster);
    // The second time for longer than a lease.
    await wait(awayMs);
    await startOwnCluster(cluster);
  }
  await untilEnded(FILES);
  expect(await count(sql`select count(*) as n from import_files where import_id = ${id} and state = 'done'`)).toBe(FILES);
  expect(await count(sql`select count(*) as n from asset_versions v join assets a on a.id = v.asset_id where a.show_id = ${cast.show.id}`)).toBe(FILES);
  expect(await count(sql`select count(*) as n from audit_events where show_id = ${cast.show.id} and act = 'import-version'`)).toBe(FILES);
  expect(await count(sql`select count(*) as n from geometry_records`)).toBe(FILES);
  expect(await count(sql`select count(*) as n from part_current where show_id = ${cast.show.id}`)).toBe(FILES);
  expect(await count(sql`select count(*) as n from imports where id = ${id} and state = 'done'`)).toBe(1);
  for (let turns = 0; turns < 600 && (await count(sql`select count(*) as n from mails where state = 'sent'`)) === 0; turns++) await wait(100);
  expect(await count(sql`select count(*) as n from mails where state = 'sent'`)).toBe(1);
  expect(await count(sql`select count(*) as n from mails`)).toBe(1);
  expect(smtp.taken.map((mail) => mail.to)).toEqual([[cast.people.td.email]]);
  // They are the processes that were there before the first restart: one that had ended of it would have another code.
  expect(await Promise.all(workers.map((worker) => worker.end('SIGTERM')))).toEqual([0, 0]);
});
