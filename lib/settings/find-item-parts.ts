import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { SetValuesItem } from '@/lib/rules/inputs/set-values';

/** The row that an item names, as it is now. */
export interface ItemPart {
  partId: string;
  assetId: string;
  revision: number;
  /** Time of the row's last change, ISO 8601. */
  updatedAt: string;
}

interface Found extends Record<string, unknown> {
  ordinal: string;
  part_id: string;
  asset_id: string;
  revision: number;
  updated_at: string;
}

/** The rows that the items name, aligned with them; null where the show has no such row. */
export async function findItemParts(db: Executor, showId: string, items: readonly SetValuesItem[]): Promise<(ItemPart | null)[]> {
  const { rows } = await db.execute<Found>(sql`
    select given.ordinal, c.part_id, c.asset_id, c.revision, c.updated_at
    from unnest(${sql.param(items.map((item) => item.asset))}::text[], ${sql.param(items.map((item) => item.part ?? ''))}::text[]) with ordinality as given(asset, part, ordinal)
    join part_current c on c.show_id = ${showId} and c.asset = given.asset collate "C" and c.part = given.part collate "C" and c."row" = 'part'`);
  const found: (ItemPart | null)[] = items.map(() => null);
  for (const row of rows) found[Number(row.ordinal) - 1] = { partId: row.part_id, assetId: row.asset_id, revision: row.revision, updatedAt: new Date(row.updated_at).toISOString() };
  return found;
}
