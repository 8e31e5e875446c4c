import type { Database } from '@/db/client';
import { importFilesHandler, type JobTools } from './handlers/import-files';
import { tellImportHandler } from './handlers/tell-import';
import { importFilesJob, tellImportJob, type QueueName } from './registry';
import { queueOf } from './send-jobs';

/**
 * Does the waiting jobs in this process until none is left, for a script that has no worker beside it. Workers may go on
 * meanwhile: a job is taken by one of them. Answers how many jobs were done here; a job that fails throws.
 */
export async function drainQueue(db: Database, engine: JobTools['engine']): Promise<number> {
  const handlers: Record<QueueName, (data: unknown) => Promise<void>> = {
    'import-files': (data) => importFilesHandler({ db, engine }, importFilesJob.parse(data)),
    'tell-import': (data) => tellImportHandler(db, tellImportJob.parse(data)),
  };
  let done = 0;
  // Files first: the last one of an import queues the telling of it.
  while ((await doNext(db, 'import-files', handlers)) || (await doNext(db, 'tell-import', handlers))) done++;
  return done;
}

async function doNext(db: Database, name: QueueName, handlers: Record<QueueName, (data: unknown) => Promise<void>>): Promise<boolean> {
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
