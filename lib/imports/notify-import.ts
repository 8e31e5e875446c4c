import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';

export const IMPORT_CHANNEL = 'weighhouse_imports';

/** Tells every process that this import changed, when the transaction commits. */
export async function notifyImport(tx: Executor, importId: string): Promise<void> {
  await tx.execute(sql`select pg_notify(${IMPORT_CHANNEL}, ${importId})`);
}

export const SESSIONS_CHANNEL = 'weighhouse_sessions';

/** Tells every process that somebody signed out somewhere, so that no stream of theirs outlives the session it was opened under. */
export async function notifySignOut(db: Executor, userId: string): Promise<void> {
  await db.execute(sql`select pg_notify(${SESSIONS_CHANNEL}, ${userId})`);
}
