import type { Database } from '@/db/client';
import { handlersOf, type Handlers } from './handlers';
import type { JobTools } from './handlers/import-files';
import { QUEUE_NAMES, type QueueName } from './registry';
import { queueOf } from './send-jobs';
import { ownSeat } from './worker-seat';

/**
 * Does the waiting jobs in this process until none is left, for a script that has no worker beside it. Workers may go on
 * meanwhile: a job is taken by one of them. Answers how many jobs were done here; a job that fails throws.
 */
export async function drainQueue(db: Database, engine: JobTools['engine']): Promise<number> {
  const handlers = handlersOf({ db, engine, seat: ownSeat() });
  let done = 0;
  while (await doNext(db, handlers)) done++;
  return done;
}

/** Files first: the last one of an import queues the telling of it. */
async function doNext(db: Database, handlers: Handlers): Promise<boolean> {
  for (const name of QUEUE_NAMES) if (await doOne(db, name, handlers)) return true;
  return false;
}

async function doOne(db: Database, name: QueueName, handlers: Handlers): Promise<boolean> {
  const boss = queueOf(db);
  const [job] = await boss.fetch<unknown>(name, { batchSize: 1 });
  if (!job) return false;
  try {
    await handlers[name](job.data);
  } catch (error) {
    await boss.fail(name, job.id, { message: error instanceof Error ? error.message : 'unknown fault' });
    throw error;
  }
  await boss.complete(name, job.id);
  return true;
}
