import type PgBoss from 'pg-boss';
import { z } from 'zod';

/** Files of one import that one job takes up, in this order. */
export const importFilesJob = z.strictObject({ importId: z.uuid(), fileIds: z.array(z.uuid()).min(1).max(1000) });
export type ImportFilesJob = z.infer<typeof importFilesJob>;

/** Every queue with its payload and how a failing job is tried again: after about 2, 4, 8, 16, 32 s. */
export const QUEUES = {
  'import-files': { payload: importFilesJob, options: { retryLimit: 5, retryDelay: 2, retryBackoff: true, expireInSeconds: 3600 } },
} as const satisfies Record<string, { payload: z.ZodType; options: Omit<PgBoss.Queue, 'name'> }>;

export type QueueName = keyof typeof QUEUES;
export const QUEUE_NAMES = Object.keys(QUEUES) as QueueName[];
