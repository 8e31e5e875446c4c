import { and, eq, inArray, sql } from 'drizzle-orm';
import type { Database, Executor } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { log } from '@/lib/log';
import { notifyImport } from './notify-import';

/** How long a worker may be silent before another takes its files, and how often it speaks. */
export const LEASE_S = 10;
const HEARTBEAT_MS = 2_500;

export type ImportFile = typeof importFiles.$inferSelect;

export const UNFINISHED = ['queued', 'reading', 'measuring'] as const;

export interface Leases {
  /** The file in hand: a signal that is aborted once it is not the holder's any more, since its import was cancelled or another worker has it. */
  watch: (fileId: string) => AbortSignal;
  stop: () => void;
}

/** Renews the holder's leases until stopped. Rows that a transaction is ending are passed over: they need no lease any more. */
export function keepLeases(db: Database, holder: string): Leases {
  let inHand: { fileId: string; lost: AbortController } | null = null;
  const beat = async () => {
    await db.execute(
      sql`update import_files set lease_until = now() + make_interval(secs => ${LEASE_S}) where id in (
        select id from import_files where lease_by = ${holder} and state in ('queued', 'reading', 'measuring') for no key update skip locked)`,
    );
    const watched = inHand;
    if (watched === null) return;
    const { rows } = await db.execute(sql`select 1 from import_files where id = ${watched.fileId} and lease_by = ${holder}`);
    if (rows.length === 0) watched.lost.abort();
  };
  const timer = setInterval(() => void beat().catch((error: unknown) => log.warn({ err: error }, 'a heartbeat of import files failed')), HEARTBEAT_MS);
  return {
    watch(fileId) {
      inHand = { fileId, lost: new AbortController() };
      return inHand.lost.signal;
    },
    stop: () => clearInterval(timer),
  };
}

/** Marks a held file as being read, counting the attempt. Null when it is not held any more, or its import is paused or over. */
export async function startFile(db: Executor, fileId: string, holder: string): Promise<ImportFile | null> {
  const [started] = await db
    .update(importFiles)
    .set({ state: 'reading', attempts: sql`${importFiles.attempts} + 1`, startedAt: sql`now()` })
    .where(
      and(
        eq(importFiles.id, fileId),
        eq(importFiles.leaseBy, holder),
        inArray(importFiles.state, UNFINISHED),
        sql`exists (select 1 from imports i where i.id = ${importFiles.importId} and i.state in ('queued', 'running') and i.paused_at is null)`,
      ),
    )
    .returning();
  if (started) await notifyImport(db, started.importId);
  return started ?? null;
}

export async function markMeasuring(db: Executor, fileId: string, holder: string): Promise<void> {
  await db.update(importFiles).set({ state: 'measuring' }).where(and(eq(importFiles.id, fileId), eq(importFiles.leaseBy, holder), eq(importFiles.state, 'reading')));
}

/** Gives back what the holder still holds of these, so that the next turn takes it at once. */
export async function releaseFiles(db: Executor, fileIds: readonly string[], holder: string): Promise<void> {
  if (fileIds.length === 0) return;
  await db
    .update(importFiles)
    .set({ state: 'queued', leaseBy: null, leaseUntil: null, worker: null, startedAt: null })
    .where(and(inArray(importFiles.id, [...fileIds]), eq(importFiles.leaseBy, holder), inArray(importFiles.state, UNFINISHED)));
}
