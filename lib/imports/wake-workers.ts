import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { sendJobs } from '@/lib/jobs/send-jobs';

/** More than any studio has threads: each job wakes one that is idle, and whoever is awake goes on by itself. */
const MOST_WAKE_UPS = 32;

/** Queues turns for the waiting files of an import, within the transaction that makes them wait. */
export async function wakeWorkers(tx: Executor, importId: string): Promise<void> {
  const { rows } = await tx.execute<{ waiting: number }>(sql`
    select count(*)::int as waiting from (
      select 1 from import_files where import_id = ${importId} and state = 'queued' and queued_at is not null limit ${MOST_WAKE_UPS}) counted`);
  await sendJobs(tx, 'import-files', Array.from({ length: rows[0].waiting }, () => ({ importId })));
}
