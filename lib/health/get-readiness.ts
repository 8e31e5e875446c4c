import { randomUUID } from 'node:crypto';
import { sql } from 'drizzle-orm';
import { database } from '@/db/client';
import { disk, UNFINISHED } from '@/lib/storage/disk';

/** `down` names what does not work; the queue's age is that of the oldest job or file that could be taken up and waits, in seconds. */
export type Readiness = {
  status: 'ready' | 'down';
  database: 'ok' | 'down';
  storage: 'ok' | 'down';
  queue: 'ok' | 'down';
  oldest_waiting_job_s: number | null;
};

async function works<T>(act: () => Promise<T>): Promise<{ ok: true; value: T } | { ok: false }> {
  try {
    return { ok: true, value: await act() };
  } catch {
    // The reason may hold addresses and names: an open door tells nothing but that it is so.
    return { ok: false };
  }
}

/** Of jobs and of files alike: a file waits for a turn whether or not one is queued for it. What was paused, or put off after a fault, does not wait. */
async function oldestWaitingJob(): Promise<number | null> {
  const { rows } = await database().execute<{ age: number | null }>(
    sql`select extract(epoch from now() - least(
          (select min(greatest(created_on, start_after)) from pgboss.job
            where state < 'active' and start_after <= now() and name not like '\\_\\_pgboss%'),
          (select min(greatest(f.queued_at, f.try_after)) from import_files f join imports i on i.id = f.import_id
            where f.state = 'queued' and f.lease_by is null and i.state in ('queued', 'running') and i.paused_at is null
              and (f.try_after is null or f.try_after <= now()))))::float8 as age`,
  );
  return rows[0].age === null ? null : Math.max(0, Math.round(rows[0].age * 10) / 10);
}

async function storageTakesBytes(): Promise<void> {
  const probe = `${UNFINISHED}/probe-${randomUUID()}`;
  await (await disk()).put(probe, 'probe');
  await (await disk()).delete(probe);
}

/** Whether the program can do its work: database, storage and queue, each tried. */
export async function getReadiness(): Promise<Readiness> {
  const [db, storage, queue] = await Promise.all([
    works(() => database().execute(sql`select 1`)),
    works(storageTakesBytes),
    works(oldestWaitingJob),
  ]);
  return {
    status: db.ok && storage.ok && queue.ok ? 'ready' : 'down',
    database: db.ok ? 'ok' : 'down',
    storage: storage.ok ? 'ok' : 'down',
    queue: queue.ok ? 'ok' : 'down',
    oldest_waiting_job_s: queue.ok ? queue.value : null,
  };
}
