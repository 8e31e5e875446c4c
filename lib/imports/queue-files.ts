import type { Transaction } from '@/db/client';
import type { ImportFilesJob } from '@/lib/jobs/registry';
import { sendJobs } from '@/lib/jobs/send-jobs';
import { compareInProcessingOrder } from '@/lib/rules/import-plan';
import type { PlannedRow } from './import-plan-of';

/** A job is large enough to be worth a turn of the queue and small enough to share the work among threads. */
const JOB_BYTES = 4 * 1024 * 1024;
const JOB_FILES = 40;
const MOST_FILES = 1_000;

/**
 * Cuts files into jobs by size. Files of one asset stay together in their order, so that takes and unnumbered versions
 * come out the same every time, and so that two jobs rarely wait for one asset.
 */
export function cutIntoJobs(importId: string, files: readonly PlannedRow[]): ImportFilesJob[] {
  const jobs: ImportFilesJob[] = [];
  let fileIds: string[] = [];
  let bytes = 0;
  let asset: string | null = null;
  for (const file of files.toSorted(compareInProcessingOrder)) {
    const isFull = (file.asset !== asset && (bytes >= JOB_BYTES || fileIds.length >= JOB_FILES)) || fileIds.length >= MOST_FILES;
    if (isFull) {
      jobs.push({ importId, fileIds });
      fileIds = [];
      bytes = 0;
    }
    fileIds.push(file.id);
    bytes += file.byteSize;
    asset = file.asset;
  }
  if (fileIds.length > 0) jobs.push({ importId, fileIds });
  return jobs;
}

/** Puts the files into the queue, within the transaction that makes them wait. */
export async function queueFiles(tx: Transaction, importId: string, files: readonly PlannedRow[]): Promise<void> {
  await sendJobs(tx, 'import-files', cutIntoJobs(importId, files));
}
