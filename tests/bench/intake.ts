import { execFile } from 'node:child_process';
import { mkdtemp, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { Client } from 'pg';
import { bootstrapDatabase } from '@/db/bootstrap/bootstrap-database';
import { prepareOwnCluster } from '@/db/bootstrap/roles';
import { withDatabaseName } from '../support/database-name';

const root = fileURLToPath(new URL('../../', import.meta.url));
const run = promisify(execFile);

export interface IntakeFigures {
  files: number;
  facesPerFile: number;
  threads: number;
  /** From before the first PUT to after the last. */
  uploadS: number;
  /** From the submit to the moment at which every file's rows are there. */
  measureS: number;
}

/** A database of its own on the throw-away cluster, with the product pointed at it before its modules are loaded. */
async function withDatabase<T>(act: () => Promise<T>): Promise<T> {
  const script = (verb: string) => run(process.execPath, [path.join(root, 'lib/run/test-database.mjs'), verb, String(process.pid)]);
  const { superuserUrl, ownerUrl, appUrl } = JSON.parse((await script('use')).stdout) as Record<'superuserUrl' | 'ownerUrl' | 'appUrl', string>;
  await prepareOwnCluster(superuserUrl, ownerUrl, appUrl, true);
  const name = `wht_bench_${process.pid}`;
  const folder = await mkdtemp(path.join(os.tmpdir(), 'weighhouse-bench-'));
  const onServer = async (statement: string) => {
    const client = new Client({ connectionString: ownerUrl });
    await client.connect();
    await client.query(statement).finally(() => client.end());
  };
  try {
    await onServer(`create database ${name}`);
    await bootstrapDatabase(withDatabaseName(ownerUrl, name), withDatabaseName(appUrl, name), path.join(root, 'drizzle'));
    Object.assign(process.env, { WEIGHHOUSE_APP_DATABASE_URL: withDatabaseName(appUrl, name), WEIGHHOUSE_DATA: folder, LOG_LEVEL: 'warn' });
    return await act();
  } finally {
    await onServer(`drop database if exists ${name} with (force)`);
    await rm(folder, { recursive: true, force: true });
    await script('leave');
  }
}

/** Files of about so many faces each, no two alike, from submit to the last row, with the queue and the threads of the worker. */
export function benchIntake(files = 200, faces = 2_000): Promise<IntakeFigures> {
  return withDatabase(async () => {
    const { database, closeDatabase } = await import('@/db/client');
    const { largeCage } = await import('@/db/seed/cages/large-cage');
    const { createUser, createShowRow, contextOf } = await import('../support/cast');
    const { openImport } = await import('@/lib/imports/open-import');
    const { putImportFile } = await import('@/lib/imports/put-import-file');
    const { submitImport } = await import('@/lib/imports/submit-import');
    const { getImport } = await import('@/lib/imports/get-import');
    const { onImportNotice } = await import('@/lib/imports/import-notices');
    const { startEnginePool } = await import('@/lib/jobs/engine-pool');
    const { runQueues } = await import('@/lib/jobs/run-queues');
    const { config } = await import('@/lib/config');
    const context = contextOf(await createUser({ isAdmin: true }));
    const { code: show } = await createShowRow();
    const engine = startEnginePool();
    const queues = await runQueues({ db: database(), url: config().appDatabaseUrl!, engine });
    try {
      const { id } = await openImport(context, { show });
      const texts = Array.from({ length: files }, (_, n) => largeCage(faces, n));
      const begin = performance.now();
      for (const [n, text] of texts.entries()) {
        await putImportFile(context, { show, import: id, name: `props/column${n}_v001.obj` }, new Request('http://127.0.0.1/', { method: 'PUT', body: text }));
      }
      const sent = performance.now();
      await submitImport(context, { show, import: id });
      const submitted = performance.now();
      await new Promise<void>((resolve, reject) => {
        const look = async () => {
          const { state, counts } = await getImport(context, { show, import: id });
          if (state !== 'done') return;
          stop();
          if (counts.done === files) resolve();
          else reject(new Error(`${counts.failed} of ${files} files failed.`));
        };
        const stop = onImportNotice(id, () => void look().catch(reject));
      });
      const [facesPerFile] = texts.map((text) => text.split('\n').filter((line) => line.startsWith('f ')).length);
      return { files, facesPerFile, threads: engine.threads, uploadS: (sent - begin) / 1000, measureS: (performance.now() - submitted) / 1000 };
    } finally {
      await queues.stop();
      await engine.close();
      await closeDatabase();
    }
  });
}

/** The figures as lines of the report. */
export async function printIntake(): Promise<void> {
  const { files, facesPerFile, threads, uploadS, measureS } = await benchIntake();
  console.log(`intake: ${files} files of ${facesPerFile} faces, ${threads} threads`);
  console.log(`  upload  ${uploadS.toFixed(2)} s, ${(files / uploadS).toFixed(0)} files/s`);
  console.log(`  submit to all rows  ${measureS.toFixed(2)} s, ${(files / measureS).toFixed(1)} files/s, ${((files * facesPerFile) / measureS).toFixed(0)} faces/s`);
}
