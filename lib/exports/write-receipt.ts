import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { receipts } from '@/db/schema/receipts';
import type { Actor } from '@/lib/context';

export interface HandOff {
  showId: string;
  /** Of a shot's export. */
  shotId?: string;
  format: string;
  selection: string;
  rows: number;
  byteSize: number;
  sha256: string;
}

/** A row that was handed off: which value of which part, and under which lock. */
export interface HandedRow {
  partId: string;
  valueSha256: string | null;
  lockId?: string;
}

/**
 * Notes who took which rows with which checksum. A token that takes the same bytes again on the same day (UTC) is noted once.
 * The caller's transaction, if it has one, holds both the receipt and its rows; else they are written in one of their own.
 * @param handed the rows in pages, which are read only where the receipt is new
 */
export async function writeReceipt(db: Executor, actor: Actor, { showId, shotId, format, selection, rows, byteSize, sha256 }: HandOff, handed: Iterable<readonly HandedRow[]> | AsyncIterable<readonly HandedRow[]>): Promise<void> {
  await db.transaction(async (tx) => {
    const [receipt] = await tx
      .insert(receipts)
      .values({ showId, shotId, userId: actor.userId, tokenId: actor.tokenId, format, selection, rows, byteSize, sha256, day: sql`(now() at time zone 'utc')::date` })
      .onConflictDoNothing()
      .returning({ id: receipts.id });
    if (!receipt) return;
    for await (const page of handed) {
      await tx.execute(sql`
        insert into receipt_rows (receipt_id, part_id, lock_id, value_sha256)
        select ${receipt.id}::uuid, * from unnest(${sql.param(page.map((row) => row.partId))}::uuid[], ${sql.param(page.map((row) => row.lockId ?? null))}::uuid[], ${sql.param(page.map((row) => row.valueSha256))}::text[])`);
    }
  });
}
