import type PgBoss from 'pg-boss';
import { z } from 'zod';

/** Files of one import that one job takes up, in this order. */
export const importFilesJob = z.strictObject({ importId: z.uuid(), fileIds: z.array(z.uuid()).min(1).max(1000) });
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
