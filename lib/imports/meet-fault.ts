import { randomUUID } from 'node:crypto';
import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { fileFaults } from '@/db/schema/file-faults';
import { importFiles } from '@/db/schema/import-files';
import { isHeavy, type PassingFault } from '@/lib/jobs/passing-fault';
import { sendJobs } from '@/lib/jobs/send-jobs';
import { log } from '@/lib/log';
import { endFile } from './end-file';
import type { ImportFile } from './lease';
import { notifyImport } from './notify-import';

/** A file that met a passing fault this often is given up; by then some four minutes have gone by. */
export const MOST_ATTEMPTS = 8;

/** Seconds until the next try: 2, 4, 8 … after the first, second, third. */
const pauseAfter = (attempt: number): number => 2 ** Math.min(attempt, 9);

/**
 * A fault that may pass has met this locked, held file: written to its history, and the file is put off, each time for twice as long, or given up where that
 * happened too often. One that may have pulled others down with it, twice, is next tried with nothing beside it.
 */
export async function meetFault(tx: Transaction, file: ImportFile, fault: PassingFault): Promise<void> {
  const isLast = file.attempts >= MOST_ATTEMPTS;
  const againAt = isLast ? null : sql`now() + make_interval(secs => ${pauseAfter(file.attempts)})`;
  await tx.insert(fileFaults).values({ importFileId: file.id, attempt: file.attempts, worker: file.worker, ...fault, againAt });
  if (isLast) {
    const reference = randomUUID();
    log.error({ reference, file: file.name, fileId: file.id, fault }, 'a file was begun again and again without an end');
    const message = `This file was begun ${file.attempts} times and never came to an end. ${fault.message} Reference ${reference}.`;
    return endFile(tx, file, { state: 'failed', error: { code: 'gave_up', message, line: null, column: null } });
  }
  const isAlone = file.isAlone || fault.code === 'memory' || (isHeavy(fault) && file.attempts >= 2);
  await tx
    .update(importFiles)
    .set({ state: 'queued', tryAfter: againAt, isAlone, leaseBy: null, leaseUntil: null, worker: null, startedAt: null })
    .where(eq(importFiles.id, file.id));
  await sendJobs(tx, 'import-files', [{ importId: file.importId }], pauseAfter(file.attempts));
  await notifyImport(tx, file.importId);
}
