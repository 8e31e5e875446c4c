import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import { claimFiles, keepLeases, releaseFiles } from '@/lib/imports/lease';
import { measureImportFile, type FileWork } from '@/lib/imports/measure-import-file';
import { planOfImport } from '@/lib/imports/import-plan-of';
import { log } from '@/lib/log';
import type { EnginePool } from '../engine-pool';
import type { ImportFilesJob } from '../registry';

export interface JobTools {
  db: Database;
  engine: Pick<EnginePool, 'measure'>;
  /** Aborted when the process shuts down: the file in hand is ended, the rest is given back. */
  signal?: AbortSignal;
}

/**
 * Takes up the files of one job that nobody else holds, in the job's order. Each ends once. Files that met a passing fault
 * are given back and the job fails, so that the queue tries it again later; the others are not touched by that.
 */
export async function importFilesHandler({ db, engine, signal }: JobTools, job: ImportFilesJob): Promise<void> {
  const [found] = await db
    .select({ importRow: imports, pattern: shows.namePattern, user: users })
    .from(imports)
    .innerJoin(shows, eq(shows.id, imports.showId))
    .innerJoin(users, eq(users.id, imports.createdBy))
    .where(eq(imports.id, job.importId));
  if (!found || !['queued', 'running'].includes(found.importRow.state)) return;
  const holder = randomUUID();
  const claimed = new Set((await claimFiles(db, job.importId, job.fileIds, holder)).map((file) => file.id));
  if (claimed.size === 0) return;
  const leases = keepLeases(db, holder);
  const waiting = job.fileIds.filter((id) => claimed.has(id));
  const { user } = found;
  const actor = { userId: user.id, email: user.email, name: user.name, isAdmin: user.isAdmin, via: 'system' as const, tokenId: null };
  const work: FileWork = { db, engine, holder, importRow: found.importRow, actor };
  let fault: unknown = null;
  try {
    const plans = new Map((await planOfImport(db, job.importId, found.pattern)).map((plan) => [plan.id, plan]));
    for (let id = waiting.shift(); id !== undefined; id = waiting.shift()) {
      if (signal?.aborted) {
        waiting.unshift(id);
        throw new Error('The worker is shutting down.');
      }
      try {
        await measureImportFile(work, id, plans.get(id)!);
      } catch (error) {
        fault = error;
        log.warn({ err: error, importId: job.importId, fileId: id }, 'a file met a fault and will be tried again');
        await releaseFiles(db, [id], holder);
      }
    }
  } finally {
    leases.stop();
    await releaseFiles(db, waiting, holder);
  }
  if (fault !== null) throw fault;
}
