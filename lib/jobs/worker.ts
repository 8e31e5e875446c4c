import { closeDatabase, database } from '@/db/client';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { runMailSweep } from '@/lib/mail/run-mail-sweep';
import { runStorageSweep } from '@/lib/storage/run-storage-sweep';
import { startEnginePool } from './engine-pool';
import { passingFaultOf } from './passing-fault';
import { runDigestSweep } from './run-digest-sweep';
import { runQueues } from './run-queues';

/**
 * The queue's library writes down the end of a job without waiting for it: where the database is away just then, nobody hears of it but here. The job is
 * delivered again, which it bears. Whatever else nobody waited for is a fault of ours.
 */
function onUnheard(error: unknown): void {
  if (['database', 'network', 'busy'].includes(passingFaultOf(error).code)) return log.warn({ err: error }, 'the end of a job could not be written down');
  log.fatal({ err: error }, 'something failed that nobody waited for');
  process.exit(1);
}

/** The worker process: takes jobs from the queue and sends waiting messages until it is told to end. */
async function main(): Promise<void> {
  const url = config().appDatabaseUrl;
  if (!url) throw new Error('No database: set DATABASE_URL, or start with npm start.');
  process.on('unhandledRejection', onUnheard);
  const engine = startEnginePool();
  const queues = await runQueues({ db: database(), url, engine });
  const mails = runMailSweep(database());
  const digests = runDigestSweep(database());
  const storage = runStorageSweep(database());
  log.info({ threads: engine.threads }, 'worker is ready');
  let isEnding = false;
  const end = async (signal: string) => {
    if (isEnding) return;
    isEnding = true;
    log.info({ signal }, 'worker ends');
    await Promise.all([queues.stop(), mails.stop(), digests.stop(), storage.stop()]);
    await engine.close();
    await closeDatabase();
    process.exit(0);
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => void end(signal));
}

main().catch((error: unknown) => {
  log.fatal({ err: error }, 'worker could not start');
  process.exit(1);
});
