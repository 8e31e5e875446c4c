import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';

/** Lets one transaction at a time change who the studio's admins are, so that two cannot each remove the other. */
export async function lockAdmins(tx: Transaction): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(7305120)`);
}
