import { and, eq, inArray, isNull, lt, or, sql } from 'drizzle-orm';
import type { Database, Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { log } from '@/lib/log';
import { notifyImport } from './notify-import';

/** How long a worker may be silent before another takes its files, and how often it speaks. */
export const LEASE_S = 10;
const HEARTBEAT_MS = 2_500;

export type ImportFile = typeof importFiles.$inferSelect;

const UNFINISHED = ['queued', 'reading', 'measuring'] as const;

/** Takes those of the files that nobody holds and that have not ended. A file is held by one worker at a time. */
export async function claimFiles(db: Database, importId: string, fileIds: readonly string[], holder: string): Promise<ImportFile[]> {
  return db.transaction(async (tx) => {
    const claimed = await tx
      .update(importFiles)
      .set({ leaseBy: holder, leaseUntil: sql`now() + make_interval(secs => ${LEASE_S})` })
      .where(
        and(
          eq(importFiles.importId, importId),
          inArray(importFiles.id, [...fileIds]),
          inArray(importFiles.state, UNFINISHED),
          or(isNull(importFiles.leaseUntil), lt(importFiles.leaseUntil, sql`now()`)),
        ),
      )
      .returning();
    if (claimed.length > 0) {
      await tx.update(imports).set({ state: 'running' }).where(and(eq(imports.id, importId), eq(imports.state, 'queued')));
      await notifyImport(tx, importId);
    }
    return claimed;
  });
}

/** Renews the holder's leases until stopped. Rows that a transaction is ending are passed over: they need no lease any more. */
export function keepLeases(db: Database, holder: string): { stop: () => void } {
  const beat = () =>
    db
      .execute(
        sql`update import_files set lease_until = now() + make_interval(secs => ${LEASE_S}) where id in (
          select id from import_files where lease_by = ${holder} and state in ('queued', 'reading', 'measuring') for no key update skip locked)`,
      )
      .catch((error: unknown) => log.warn({ err: error }, 'a heartbeat of import files failed'));
  const timer = setInterval(() => void beat(), HEARTBEAT_MS);
  return { stop: () => clearInterval(timer) };
}

/** Marks a held file as being read, counting the attempt. Null when it is not held any more. */
export async function startFile(db: Executor, fileId: string, holder: string): Promise<ImportFile | null> {
  const [started] = await db
    .update(importFiles)
    .set({ state: 'reading', attempts: sql`${importFiles.attempts} + 1` })
    .where(and(eq(importFiles.id, fileId), eq(importFiles.leaseBy, holder), inArray(importFiles.state, UNFINISHED)))
    .returning();
  if (started) await notifyImport(db, started.importId);
  return started ?? null;
}

export async function markMeasuring(db: Executor, fileId: string, holder: string): Promise<void> {
  await db.update(importFiles).set({ state: 'measuring' }).where(and(eq(importFiles.id, fileId), eq(importFiles.leaseBy, holder), eq(importFiles.state, 'reading')));
}

/** Gives back what the holder still holds of these, so that the next job takes it at once. */
export async function releaseFiles(db: Executor, fileIds: readonly string[], holder: string): Promise<void> {
  if (fileIds.length === 0) return;
  await db
    .update(importFiles)
    .set({ state: 'queued', leaseBy: null, leaseUntil: null })
    .where(and(inArray(importFiles.id, [...fileIds]), eq(importFiles.leaseBy, holder), inArray(importFiles.state, UNFINISHED)));
}
