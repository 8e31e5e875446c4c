import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { partCurrent } from '@/db/schema/part-current';
import { parts } from '@/db/schema/parts';
import { swapPartNames, type NamedPart } from '@/lib/values/swap-part-names';

/**
 * Makes a part that the current version lacks the one that came under another name: it takes that name and that row, with the row's
 * revision, so that whoever still holds the other part's row is told that it changed. Nothing of the other part is lost: what was set on
 * it stays in its history, under the old name.
 */
export async function takeIdentity(tx: Transaction, part: NamedPart, arrived: NamedPart): Promise<void> {
  await tx.update(parts).set({ mergedInto: part.id }).where(eq(parts.mergedInto, arrived.id));
  await swapPartNames(tx, part, arrived);
  await tx.update(partCurrent).set({ partId: part.id }).where(eq(partCurrent.partId, arrived.id));
  await tx.execute(sql`update approval_requests set closed_at = now() where part_id = ${arrived.id} and closed_at is null`);
}
