import { statfs } from 'node:fs/promises';
import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { requireAdmin } from '@/lib/auth/require-admin';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import { log } from '@/lib/log';

export interface StudioState {
  /** Jobs by what becomes of them; null where the queue cannot be read. */
  queue: { waiting: number; running: number; failed: number; oldest_waiting_s: number | null } | null;
  /** Of the disk that holds the studio's files; null where it cannot be read. */
  disk: { free_bytes: number; total_bytes: number } | null;
  /** What the studio itself keeps. */
  kept: { database_bytes: number; file_bytes: number; files: number };
  failures: StudioFailure[];
  mail: { waiting: number; failed: number; local: number; server: boolean };
}

export interface StudioFailure {
  /** What failed: an import's file, or a job of the queue. */
  kind: 'file' | 'job';
  subject: string;
  reason: string;
  show: string | null;
  at: string;
}

const FAILURES_SHOWN = 20;

/** How the studio's own machine is doing: queue, disk and what failed lately, in words of this program alone. */
export async function getStudioState(context: Context): Promise<StudioState> {
  const { db } = requireAdmin(context, 'readStudio');
  const [queue, disk, kept, files, jobs, mail] = await Promise.all([readQueue(db), readDisk(), readKept(db), failedFiles(db), failedJobs(db), readMail(db)]);
  const failures = [...files, ...jobs].sort((a, b) => (a.at < b.at ? 1 : -1)).slice(0, FAILURES_SHOWN);
  return { queue, disk, kept, failures, mail };
}

/** The queue's tables belong to the queue: where they are absent or differ, that is said instead of failing the page. */
async function orNull<T>(read: () => Promise<T>, what: string): Promise<T | null> {
  try {
    return await read();
  } catch (error) {
    log.warn({ err: error }, `${what} cannot be read`);
    return null;
  }
}

function readQueue(db: Database): Promise<StudioState['queue']> {
  return orNull(async () => {
    const { rows } = await db.execute<{ waiting: number; running: number; failed: number; oldest_waiting_s: number | null }>(sql`
      select count(*) filter (where state in ('created', 'retry'))::int as waiting,
             count(*) filter (where state = 'active')::int as running,
             count(*) filter (where state = 'failed')::int as failed,
             round(extract(epoch from now() - min(greatest(created_on, start_after)) filter (where state in ('created', 'retry') and start_after <= now())))::int as oldest_waiting_s
      from pgboss.job where name not like '\\_\\_pgboss%'`);
    return rows[0];
  }, 'the queue');
}

function readDisk(): Promise<StudioState['disk']> {
  return orNull(async () => {
    const stats = await statfs(config().dataFolder);
    return { free_bytes: stats.bavail * stats.bsize, total_bytes: stats.blocks * stats.bsize };
  }, 'the disk');
}

async function readKept(db: Database): Promise<StudioState['kept']> {
  const { rows } = await db.execute<{ database_bytes: string; file_bytes: string; files: number }>(
    sql`select pg_database_size(current_database()) as database_bytes, coalesce(sum(byte_size), 0) as file_bytes, count(*)::int as files from blobs`,
  );
  return { database_bytes: Number(rows[0].database_bytes), file_bytes: Number(rows[0].file_bytes), files: rows[0].files };
}

async function failedFiles(db: Database): Promise<StudioFailure[]> {
  const { rows } = await db.execute<{ name: string; reason: string | null; show: string; at: Date | string }>(sql`
    select f.name, f.error_message as reason, s.code as show, coalesce(f.ended_at, i.created_at) as at
    from import_files f join imports i on i.id = f.import_id join shows s on s.id = i.show_id
    where f.state = 'failed' order by at desc limit ${FAILURES_SHOWN}`);
  return rows.map((row) => ({ kind: 'file', subject: row.name, reason: row.reason ?? 'No reason was kept.', show: row.show, at: new Date(row.at).toISOString() }));
}

async function failedJobs(db: Database): Promise<StudioFailure[]> {
  const found = await orNull(async () => {
    const { rows } = await db.execute<{ name: string; tries: number; at: Date | string }>(sql`
      select name, retry_count + 1 as tries, coalesce(completed_on, created_on) as at from pgboss.job
      where state = 'failed' and name not like '\\_\\_pgboss%' order by at desc limit ${FAILURES_SHOWN}`);
    return rows;
  }, 'failed jobs');
  return (found ?? []).map((row) => ({
    kind: 'job',
    subject: row.name.replaceAll('-', ' '),
    reason: row.tries > 1 ? `Given up after ${row.tries} attempts. The worker’s log has the reason.` : 'Could not be done. The worker’s log has the reason.',
    show: null,
    at: new Date(row.at).toISOString(),
  }));
}

async function readMail(db: Database): Promise<StudioState['mail']> {
  const { rows } = await db.execute<{ waiting: number; failed: number; local: number }>(sql`
    select count(*) filter (where state = 'waiting')::int as waiting,
           count(*) filter (where state = 'failed')::int as failed,
           count(*) filter (where state = 'local')::int as local from mails`);
  return { ...rows[0], server: config().smtpUrl !== null };
}
