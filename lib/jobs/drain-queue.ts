import type { Database } from '@/db/client';
import { importFilesHandler, type JobTools } from './handlers/import-files';
import { importFilesJob } from './registry';
import { queueOf } from './send-jobs';

/**
 * Does the waiting jobs in this process until none is left, for a script that has no worker beside it. Workers may go on
 * meanwhile: a job is taken by one of them. Answers how many jobs were done here; a job that fails throws.
 */
export async function drainQueue(db: Database, engine: JobTools['engine']): Promise<number> {
  const boss = queueOf(db);
  for (let done = 0; ; done++) {
    const [job] = await boss.fetch<unknown>('import-files', { batchSize: 1 });
    if (!job) return done;
    try {
      await importFilesHandler({ db, engine }, importFilesJob.parse(job.data));
    } catch (error) {
      await boss.fail('import-files', job.id, { message: error instanceof Error ? error.message : 'unknown fault' });
      throw error;
    }
    await boss.complete('import-files', job.id);
  }
}
