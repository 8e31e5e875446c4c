import { and, eq, inArray, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { imports } from '@/db/schema/imports';
import { sendJobs } from '@/lib/jobs/send-jobs';
import type { ImportFileError, Remark } from '@/lib/rules/import-answer';
import type { ImportFile } from './lease';
import { notifyImport } from './notify-import';

export type FileEnd =
  // An archive that became files of its own, or a file that is read with another: neither makes a version.
  | { state: 'done'; unpackedInto: number | null; remark: Remark }
  | { state: 'done'; assetId: string; versionId: string; parts: number; problems: number; remark: string | null }
  | { state: 'failed'; error: ImportFileError };

/** Locks a file that this holder may still end; null when it ended, was cancelled or went to another worker meanwhile. */
export async function lockHeldFile(tx: Transaction, fileId: string, holder: string): Promise<ImportFile | null> {
  const [file] = await tx
    .select()
    .from(importFiles)
    .where(and(eq(importFiles.id, fileId), eq(importFiles.leaseBy, holder), inArray(importFiles.state, ['reading', 'measuring'])))
    .for('no key update');
  return file ?? null;
}

/** Ends a locked file, and with the last one its import, in the transaction of what the file brought. */
export async function endFile(tx: Transaction, file: ImportFile, end: FileEnd): Promise<void> {
  const { state: _state, ...brought } = end;
  const fields = 'error' in brought ? { errorCode: brought.error.code, errorMessage: brought.error.message, errorLine: brought.error.line, errorColumn: brought.error.column, errorExcerpt: brought.error.excerpt ?? null } : brought;
  await tx.update(importFiles).set({ state: end.state, ...fields, endedAt: sql`now()`, leaseBy: null, leaseUntil: null, worker: null }).where(eq(importFiles.id, file.id));
  await endImportWhenOver(tx, file.importId);
  await notifyImport(tx, file.importId);
}

/**
 * Ends the import when no file is left. Its row is locked first, so that of two last files that end side by side the later
 * one sees the other's end. Lock order everywhere: files, asset, show, import. A job follows that tells people what it moved.
 */
export async function endImportWhenOver(tx: Transaction, importId: string): Promise<void> {
  await tx.select({ id: imports.id }).from(imports).where(eq(imports.id, importId)).for('no key update');
  const ended = await tx
    .update(imports)
    .set({ state: 'done', endedAt: sql`now()`, pausedAt: null })
    .where(
      and(
        eq(imports.id, importId),
        inArray(imports.state, ['queued', 'running']),
        sql`not exists (select 1 from import_files where import_id = ${importId} and state in ('queued', 'reading', 'measuring'))`,
      ),
    )
    .returning({ id: imports.id });
  if (ended.length > 0) await sendTelling(tx, importId);
}

/** Queues the telling of an import that has ended; of one that was tried again, of what came since. */
export async function sendTelling(tx: Transaction, importId: string): Promise<void> {
  const { rows } = await tx.execute<{ since: string | null }>(sql`select max(at)::text as since from audit_events where act = 'retry-import' and subject = ${importId}::text`);
  await sendJobs(tx, 'tell-import', [{ importId, since: rows[0].since }]);
}
