import type PgBoss from 'pg-boss';
import { z } from 'zod';

/**
 * A turn: whoever takes it up measures the next chunk of files that wait, of whichever show is in turn. It names the import that asked for it; an import has
 * no turns of its own, so that none can be lost, doubled, or stand behind another show's.
 */
export const importFilesJob = z.object({ importId: z.uuid() });
export type ImportFilesJob = z.infer<typeof importFilesJob>;

/** An import whose last file has ended: people are told of what it moved. Of one that was tried again, since when its files count. */
export const tellImportJob = z.strictObject({ importId: z.uuid(), since: z.string().nullable() });
export type TellImportJob = z.infer<typeof tellImportJob>;

/** Every queue with its payload and how a failing job is tried again: after about 2, 4, 8, 16, 32 s. */
export const QUEUES = {
  'import-files': { payload: importFilesJob, options: { retryLimit: 5, retryDelay: 2, retryBackoff: true, expireInSeconds: 3600 } },
  'tell-import': { payload: tellImportJob, options: { retryLimit: 5, retryDelay: 2, retryBackoff: true, expireInSeconds: 300 } },
} as const satisfies Record<string, { payload: z.ZodType; options: Omit<PgBoss.Queue, 'name'> }>;

export type QueueName = keyof typeof QUEUES;
export const QUEUE_NAMES = Object.keys(QUEUES) as QueueName[];
