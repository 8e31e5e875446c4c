import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { partCurrent } from '@/db/schema/part-current';
import type { PartRow } from '@/lib/rules/part-row';
import { partRowsWithFindings } from './part-rows-with-findings';

/** Rows by id, in the order of the ids. The caller has checked that they may be seen. */
export async function partRowsById(db: Executor, show: string, partIds: readonly string[]): Promise<PartRow[]> {
  if (partIds.length === 0) return [];
  const stored = await db
    .select()
    .from(partCurrent)
    .where(sql`${partCurrent.partId} = any(${sql.param(partIds)}::uuid[])`);
  const rows = await partRowsWithFindings(db, show, stored);
  const byId = new Map(rows.map((row) => [row.part_id, row]));
  return partIds.map((id) => {
    const row = byId.get(id);
    if (!row) throw new Error(`Part ${id} has no row.`);
    return row;
  });
}
