import PgBoss from 'pg-boss';
import { sql } from 'drizzle-orm';
import { ZodError } from 'zod';
import type { Database } from '@/db/client';
import { log } from '@/lib/log';
import type { EnginePool } from './engine-pool';
import { handlersOf } from './handlers';
import { QUEUE_NAMES, type QueueName } from './registry';
import { ensureQueues } from './send-jobs';
import { sweepLostFiles } from './sweep-lost-files';
import { takeSeat } from './worker-seat';

const POLLING_S = 0.5;
const SWEEP_MS = 2_000;

export interface RunningQueues {
  stop(): Promise<void>;
}

/** Loops that work a queue in one process: of those that measure one more than there are engine threads, so that a thread has its next file while the last one's numbers are written. */
const loopsOf = (name: QueueName, threads: number): number => (name === 'import-files' ? threads + 1 : 1);

/** Works the queues until stopped. On stop the file in hand is ended and the rest goes back to the queue. */
export async function runQueues({ db, url, engine }: { db: Database; url: string; engine: EnginePool }): Promise<RunningQueues> {
  await ensureQueues(db);
  const { seat, leave } = await takeSeat(db, engine.threads);
  const boss = new PgBoss({ connectionString: url, max: 3, migrate: false, schedule: false, application_name: 'weighhouse worker' });
  boss.on('error', (error) => log.warn({ err: error }, 'the queue met a fault'));
  await boss.start();
  const ending = new AbortController();
  const handlers = handlersOf({ db, engine, seat, signal: ending.signal });
  for (const name of QUEUE_NAMES) {
    for (let loop = 0; loop < loopsOf(name, engine.threads); loop++) {
      const id: string = await boss.work<unknown>(name, { batchSize: 1, pollingIntervalSeconds: POLLING_S }, async ([job]) => {
        await handlers[name](job.data).catch((error: unknown) => failing(db, job.id, error));
        // There may be more: ask at once instead of after the polling interval.
        boss.notifyWorker(id);
      });
    }
  }
  const sweeper = setInterval(() => void sweepLostFiles(db).catch((error: unknown) => log.warn({ err: error }, 'the sweep for lost files failed')), SWEEP_MS);
  return {
    async stop() {
      clearInterval(sweeper);
      ending.abort();
      await boss.stop({ graceful: true, wait: true, timeout: 60_000 });
      await leave();
    },
  };
}

/** The job fails, and the queue tries it again; one whose payload cannot be read fails for good. */
async function failing(db: Database, jobId: string, error: unknown): Promise<never> {
  if (error instanceof ZodError) {
    await db.execute(sql`update pgboss.job set retry_limit = retry_count where id = ${jobId}`);
    log.error({ jobId, issues: error.issues }, 'a job has a payload that cannot be read');
  }
  throw error;
}
