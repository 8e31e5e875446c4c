import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { secondsLeft, WORK_OF_A_FILE } from '@/lib/rules/time-left';

/** The pace is that of so many last seconds: what went before says little of what is left. */
const WINDOW_S = 120;

interface PaceRow extends Record<string, unknown> {
  seconds: number | null;
  files: number;
  work: number;
  left: number;
}

/**
 * Seconds until an import ends at its present pace; null while that cannot be told. Counted from the first end of the last two
 * minutes (since the import was last queued or resumed), whose own work is not counted, as it began before.
 */
export async function importSecondsLeft(db: Executor, importId: string): Promise<number | null> {
  const { rows } = await db.execute<PaceRow>(sql`
    with since as (
      select greatest(clock_timestamp() - make_interval(secs => ${WINDOW_S}), i.submitted_at, (select max(e.at) from audit_events e where e.show_id = i.show_id and e.act in ('retry-import', 'resume-import') and e.subject = i.id::text)) as at
      from imports i where i.id = ${importId}
    ), file as (
      select f.state in ('done', 'failed') as ended, f.ended_at, f.byte_size + ${WORK_OF_A_FILE} as work from import_files f where f.import_id = ${importId}
    ), first as (select min(ended_at) as at from file, since where ended_at > since.at)
    select extract(epoch from clock_timestamp() - first.at)::float8 as seconds,
      count(*) filter (where ended_at > first.at)::int as files,
      coalesce(sum(work) filter (where ended_at > first.at), 0)::float8 as work,
      coalesce(sum(work) filter (where not ended), 0)::float8 as left
    from file, first group by first.at`);
  const pace = rows.at(0);
  return pace?.seconds == null ? null : secondsLeft({ ...pace, seconds: pace.seconds });
}
