import { eq, inArray, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { imports } from '@/db/schema/imports';
import { users } from '@/db/schema/users';
import { claimTurn, type ClaimedTurn, type Seat } from '@/lib/imports/claim-turn';
import { lockHeldFile } from '@/lib/imports/end-file';
import { keepLeases, releaseFiles } from '@/lib/imports/lease';
import { measureImportFile, type FileWork } from '@/lib/imports/measure-import-file';
import { meetFault } from '@/lib/imports/meet-fault';
import { log } from '@/lib/log';
import type { EnginePool } from '../engine-pool';
import { passingFaultOf } from '../passing-fault';
import type { ImportFilesJob } from '../registry';
import { sendJobs } from '../send-jobs';

export interface JobTools {
  db: Database;
  engine: Pick<EnginePool, 'measure'>;
  /** Whose name and memory the turn is taken under. */
  seat: Seat;
  /** Aborted when the process shuts down: the file in hand is ended, the rest is given back. */
  signal?: AbortSignal;
}

/**
 * One turn: takes the next chunk of files that wait and brings each to its end. A file that meets a passing fault is put off with those of its asset that
 * come after it; the others are not touched by that. Where there was nothing to take, the job is done.
 */
export async function importFilesHandler(tools: JobTools, job: ImportFilesJob): Promise<void> {
  const { db, seat, signal } = tools;
  if (signal?.aborted) return;
  const turn = await claimTurn(db, seat);
  if (turn === null) return;
  await wakeAnother(db, job.importId);
  try {
    await workThrough(tools, turn);
  } finally {
    seat.memory.hold(turn.holder, 0);
  }
  await wakeAnother(db, job.importId);
}

async function workThrough({ db, engine, seat, signal }: JobTools, { holder, files }: ClaimedTurn): Promise<void> {
  const leases = keepLeases(db, holder);
  const waiting = [...files];
  try {
    const submitters = await submittersOf(db, [...new Set(files.map((file) => file.importId))]);
    for (let file = waiting.shift(); file !== undefined; file = waiting.shift()) {
      const { id, importId, asset } = file;
      const submitter = submitters.get(importId);
      if (submitter === undefined || signal?.aborted) {
        await releaseFiles(db, [id], holder);
        continue;
      }
      seat.memory.hold(holder, Math.max(file.memory, ...waiting.map((other) => other.memory)));
      try {
        const hasStarted = await measureImportFile({ db, engine, holder, lost: leases.watch(id), ...submitter }, id);
        if (!hasStarted) await releaseFiles(db, [id], holder);
      } catch (error) {
        const fault = passingFaultOf(error);
        log.warn({ err: error, importId, fileId: id, fault: fault.code }, 'a file met a fault that may pass');
        const behind = waiting.filter((other) => asset !== null && other.asset === asset);
        for (const other of behind) waiting.splice(waiting.indexOf(other), 1);
        await releaseFiles(db, behind.map((other) => other.id), holder);
        await db.transaction(async (tx) => {
          const held = await lockHeldFile(tx, id, holder);
          if (held) await meetFault(tx, held, fault);
        });
      }
    }
  } finally {
    leases.stop();
    // Where the database is away this fails too; the leases then run out by themselves.
    await releaseFiles(db, waiting.map((file) => file.id), holder);
  }
}

/** Under whom the versions of each import are made. */
async function submittersOf(db: Database, importIds: readonly string[]): Promise<Map<string, Pick<FileWork, 'importRow' | 'actor'>>> {
  const found = await db.select({ importRow: imports, user: users }).from(imports).innerJoin(users, eq(users.id, imports.createdBy)).where(inArray(imports.id, [...importIds]));
  return new Map(
    found.map(({ importRow, user }) => [importRow.id, { importRow, actor: { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'system' as const, tokenId: null } }]),
  );
}

/** Queues one more turn where files wait and none is queued for them. */
export async function wakeAnother(db: Database, importId?: string): Promise<void> {
  const { rows } = await db.execute<{ import_id: string }>(sql`
    select f.import_id from import_files f join imports i on i.id = f.import_id
    where i.state in ('queued', 'running') and i.paused_at is null and f.state = 'queued' and f.queued_at is not null and f.lease_by is null
      and (f.try_after is null or f.try_after <= now())
      and not exists (select 1 from pgboss.job j where j.name = 'import-files' and j.state < 'active' and j.start_after <= now())
    limit 1`);
  if (rows.length > 0) await sendJobs(db, 'import-files', [{ importId: importId ?? rows[0].import_id }]);
}
