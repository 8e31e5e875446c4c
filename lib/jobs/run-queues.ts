import PgBoss from 'pg-boss';
import { sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { Database } from '@/db/client';
import { log } from '@/lib/log';
import type { EnginePool } from './engine-pool';
import { importFilesHandler } from './handlers/import-files';
import { tellImportHandler } from './handlers/tell-import';
import { importFilesJob, tellImportJob } from './registry';
import { ensureQueues } from './send-jobs';
import { sweepLostFiles } from './sweep-lost-files';

const POLLING_S = 0.5;
const SWEEP_MS = 2_000;

export interface RunningQueues {
  stop(): Promise<void>;
}

/**
 * Works the queues until stopped: one loop more than there are engine threads, so that a thread has its next file while the
 * last one's numbers are written. On stop the file in hand is ended and the rest goes back to the queue.
 */
export async function runQueues({ db, url, engine }: { db: Database; url: string; engine: EnginePool }): Promise<RunningQueues> {
  await ensureQueues(db);
  const boss = new PgBoss({ connectionString: url, max: 3, migrate: false, schedule: false, application_name: 'weighhouse worker' });
  boss.on('error', (error) => log.warn({ err: error }, 'the queue met a fault'));
  await boss.start();
  const ending = new AbortController();
  for (let loop = 0; loop <= engine.threads; loop++) {
    const id: string = await boss.work<unknown>('import-files', { batchSize: 1, pollingIntervalSeconds: POLLING_S }, async ([job]) => {
      await importFilesHandler({ db, engine, signal: ending.signal }, await payloadOf(db, importFilesJob, job));
      // There may be more: ask at once instead of after the polling interval.
      boss.notifyWorker(id);
    });
  }
  await boss.work<unknown>('tell-import', { batchSize: 1, pollingIntervalSeconds: POLLING_S }, async ([job]) => tellImportHandler(db, await payloadOf(db, tellImportJob, job)));
  const sweeper = setInterval(() => void sweepLostFiles(db).catch((error: unknown) => log.warn({ err: error }, 'the sweep for lost files failed')), SWEEP_MS);
  return {
    async stop() {
      clearInterval(sweeper);
      ending.abort();
      await boss.stop({ graceful: true, wait: true, timeout: 60_000 });
    },
  };
}

/** What the job says; one that cannot be read fails for good. */
async function payloadOf<Payload>(db: Database, schema: z.ZodType<Payload>, job: { id: string; data: unknown }): Promise<Payload> {
  const payload = schema.safeParse(job.data);
  if (payload.success) return payload.data;
  await makeFinal(db, job.id);
  log.error({ jobId: job.id, issues: payload.error.issues }, 'a job has a payload that cannot be read');
  throw new Error('The payload cannot be read.');
}

/** The job fails for good with its next failure. */
async function makeFinal(db: Database, jobId: string): Promise<void> {
  await db.execute(sql`update pgboss.job set retry_limit = retry_count where id = ${jobId}`);
}
