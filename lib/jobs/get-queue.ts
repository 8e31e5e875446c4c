import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import type { FileInHand, QueueState, TroubledFile, WaitingShow, WorkerState } from '@/lib/rules/queue-state';

/** A worker that was silent for this long is not counted as one that works. */
const SILENT_S = 30;
const MOST = 100;

/** Ends of files that are ours to mend, not the modelling department's. */
const OUR_CODES = sql`('gave_up', 'measuring_failed', 'numbers_refused', 'too_complex')`;

/** The studio's queue: the files that wait, the workers with what they have in hand, and files that met faults. For admins. */
export async function getQueue(context: Context): Promise<QueueState> {
  const { db } = requireAdmin(context, 'readStudio');
  return db.transaction(
    async (tx) => {
      const shows = await waitingShows(tx);
      const oldest = shows.filter((show) => show.oldest_s !== null).map((show) => show.oldest_s!);
      return {
        waiting_files: shows.reduce((sum, show) => sum + show.files, 0),
        oldest_waiting_s: oldest.length === 0 ? null : Math.max(...oldest),
        workers: await workersNow(tx),
        shows: shows.map(({ oldest_s: _age, ...show }) => show),
        put_off: await troubled(tx, sql`f.ended_at is null and f.try_after > now()`),
        given_up: await troubled(tx, sql`f.state = 'failed' and f.error_code in ${OUR_CODES}`),
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

async function waitingShows(tx: Executor): Promise<(WaitingShow & { oldest_s: number | null })[]> {
  const { rows } = await tx.execute<{ show: string; files: number; paused_files: number; since: Date | string; oldest_s: number | null }>(sql`
    select s.code as show, count(*) filter (where i.paused_at is null)::int as files, count(*) filter (where i.paused_at is not null)::int as paused_files,
      min(f.queued_at) as since,
      extract(epoch from now() - min(greatest(f.queued_at, f.try_after)) filter (where i.paused_at is null and (f.try_after is null or f.try_after <= now())))::float8 as oldest_s
    from import_files f join imports i on i.id = f.import_id join shows s on s.id = i.show_id
    where i.state in ('queued', 'running') and f.state = 'queued' and f.lease_by is null and f.queued_at is not null
    group by s.code order by since`);
  return rows.map((row) => ({ ...row, since: new Date(row.since).toISOString(), oldest_s: row.oldest_s === null ? null : Math.round(row.oldest_s) }));
}

async function workersNow(tx: Executor): Promise<WorkerState[]> {
  const { rows: workers } = await tx.execute<{ name: string; threads: number; memory_bytes: string; started_at: Date | string; alive: boolean }>(sql`
    select name, threads, memory_bytes, started_at, seen_at > now() - make_interval(secs => ${SILENT_S}) as alive from workers
    where seen_at > now() - interval '1 hour' order by alive desc, name limit ${MOST}`);
  const { rows: held } = await tx.execute<{ worker: string; file: string; show: string; import: string; state: FileInHand['state']; attempt: number; since: Date | string | null }>(sql`
    select f.worker, f.name as file, s.code as show, i.id as import, f.state, f.attempts as attempt, f.started_at as since
    from import_files f join imports i on i.id = f.import_id join shows s on s.id = i.show_id
    where f.lease_by is not null and f.state in ('reading', 'measuring') order by f.started_at limit ${MOST}`);
  return workers.map((worker) => ({
    name: worker.name,
    threads: worker.threads,
    memory_bytes: Number(worker.memory_bytes),
    started_at: new Date(worker.started_at).toISOString(),
    alive: worker.alive,
    files: held
      .filter((file) => file.worker === worker.name)
      .map(({ worker: _name, since, ...file }) => ({ ...file, since: since === null ? null : new Date(since).toISOString() })),
  }));
}

interface TroubledRow extends Record<string, unknown> {
  file: string;
  show: string;
  import: string;
  reason: string | null;
  again_at: string | null;
  at: string;
  faults: TroubledFile['faults'];
}

async function troubled(tx: Executor, which: ReturnType<typeof sql>): Promise<TroubledFile[]> {
  const { rows } = await tx.execute<TroubledRow>(sql`
    select f.name as file, s.code as show, i.id as import, f.error_message as reason,
      to_json(case when f.ended_at is null then f.try_after end) #>> '{}' as again_at, to_json(coalesce(f.ended_at, f.queued_at)) #>> '{}' as at,
      coalesce((select json_agg(json_build_object('at', t.at, 'attempt', t.attempt, 'worker', t.worker, 'message', t.message) order by t.at)
        from file_faults t where t.import_file_id = f.id), '[]') as faults
    from import_files f join imports i on i.id = f.import_id join shows s on s.id = i.show_id
    where ${which} order by coalesce(f.ended_at, f.queued_at) desc limit ${MOST}`);
  return rows.map((row) => ({ ...row, reason: row.reason ?? row.faults.at(-1)?.message ?? 'No reason was kept.' }));
}
