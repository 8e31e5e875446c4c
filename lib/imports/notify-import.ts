import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';

export const IMPORT_CHANNEL = 'weighhouse_imports';

/** Tells every process that this import changed, when the transaction commits. */
export async function notifyImport(tx: Executor, importId: string): Promise<void> {
  await tx.execute(sql`select pg_notify(${IMPORT_CHANNEL}, ${importId})`);
}
