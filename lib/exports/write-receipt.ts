import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { receipts } from '@/db/schema/receipts';
import type { Actor } from '@/lib/context';

export interface HandOff {
  showId: string;
  format: string;
  selection: string;
  rows: number;
  byteSize: number;
  sha256: string;
}

/** Notes who took which rows with which checksum. A token that takes the same bytes again on the same day (UTC) is noted once. */
export async function writeReceipt(db: Executor, actor: Actor, { showId, format, selection, rows, byteSize, sha256 }: HandOff): Promise<void> {
  await db
    .insert(receipts)
    .values({ showId, userId: actor.userId, tokenId: actor.tokenId, format, selection, rows, byteSize, sha256, day: sql`(now() at time zone 'utc')::date` })
    .onConflictDoNothing();
}
