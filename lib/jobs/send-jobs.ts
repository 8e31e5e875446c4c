import { sql, type SQL } from 'drizzle-orm';
import PgBoss from 'pg-boss';
import type { Database, Executor } from '@/db/client';
import { QUEUE_NAMES, QUEUES, type QueueName } from './registry';
import type { z } from 'zod';

type Payload<Name extends QueueName> = z.infer<(typeof QUEUES)[Name]['payload']>;

/** The queue's own statements, run in a transaction of ours: `$1` and its like become parameters of the transaction's client. */
function inExecutor(executor: Executor, onCount?: (rows: number) => void): PgBoss.Db {
  return {
    async executeSql(text, values: unknown[] = []) {
      const pieces = text.split(/\$(\d+)/);
      const chunks = pieces.map((piece, index): SQL => (index % 2 === 0 ? sql.raw(piece) : sql`${sql.param(values[Number(piece) - 1] ?? null)}`));
      const { rows, rowCount } = await executor.execute(sql.join(chunks));
      onCount?.(rowCount ?? 0);
      return { rows };
    },
  };
}

/** The queue within a database or a transaction of ours: to send, fetch and complete, not to work. */
export function queueOf(executor: Executor): PgBoss {
  return new PgBoss({ db: inExecutor(executor), migrate: false, supervise: false, schedule: false });
}

/** Makes the queues that are not there yet. Outside a transaction: it changes the schema of the queue's tables. */
export async function ensureQueues(db: Database): Promise<void> {
  const boss = queueOf(db);
  for (const name of QUEUE_NAMES) await boss.createQueue(name, { name, ...QUEUES[name].options });
}

/**
 * Puts jobs into the queue within the change's own transaction, so that neither exists without the other.
 * Fails when the queue does not exist: the insert would otherwise lose the jobs without a word.
 * @param afterS seconds that they wait at least
 */
export async function sendJobs<Name extends QueueName>(tx: Executor, name: Name, payloads: readonly Payload<Name>[], afterS = 0): Promise<void> {
  if (payloads.length === 0) return;
  let sent = 0;
  await queueOf(tx).insert(payloads.map((data) => ({ name, data, startAfter: `${afterS}` })), { db: inExecutor(tx, (rows) => (sent = rows)) });
  if (sent !== payloads.length) throw new Error(`The queue ${name} took ${sent} of ${payloads.length} jobs.`);
}
