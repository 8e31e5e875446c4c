import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { StudioError } from '@/lib/rules/studio-error';

/**
 * Holds the show's values until the transaction ends, so that what is computed from loaded rows is still true when it is written.
 * Answers the show's revision and the transaction's time, as PostgreSQL writes it.
 */
export async function lockShowValues(tx: Transaction, showId: string): Promise<{ revision: number; now: string }> {
  const { rows } = await tx.execute<{ revision: string; now: string }>(sql`
    select revision, now() as now from shows where id = ${showId} for no key update`);
  if (rows.length === 0) throw new StudioError('not_found', 'There is no such show.');
  return { revision: Number(rows[0].revision), now: rows[0].now };
}
