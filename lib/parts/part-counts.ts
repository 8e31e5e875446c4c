import { eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { partCurrent as c } from '@/db/schema/part-current';
import type { PartCounts } from '@/lib/rules/part-row';

/** Counts over all of a show's rows, whatever the list is filtered by. */
export async function partCounts(db: Executor, showId: string): Promise<PartCounts> {
  // One scan: grouped by asset too, which are few.
  const groups = await db
    .select({ assetId: c.assetId, state: c.state, category: c.category, rows: sql<number>`count(*)::integer`, massKg: sql<number>`coalesce(sum(${c.massKg}), 0)` })
    .from(c)
    .where(eq(c.showId, showId))
    .groupBy(c.assetId, c.state, c.category);
  const assets = new Set(groups.map((group) => group.assetId)).size;
  const counts: PartCounts = { total: 0, assets, by_state: {}, by_category: {}, mass_kg: 0 };
  for (const { state, category, rows, massKg } of groups) {
    counts.total += rows;
    counts.mass_kg += massKg;
    counts.by_state[state] = (counts.by_state[state] ?? 0) + rows;
    counts.by_category[category] = (counts.by_category[category] ?? 0) + rows;
  }
  return counts;
}
