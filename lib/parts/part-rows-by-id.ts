import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { PartRow } from '@/lib/rules/part-row';
import { partRowsWithFindings } from './part-rows-with-findings';
import { ROW_COLUMNS, type StoredRow } from './row-columns';

/** Rows by id, in the order of the ids. The caller has checked that they may be seen. */
export async function partRowsById(db: Executor, show: string, partIds: readonly string[]): Promise<PartRow[]> {
  if (partIds.length === 0) return [];
  const stored = await db.execute<StoredRow>(sql`select ${ROW_COLUMNS} from part_current where part_id = any(${sql.param(partIds)}::uuid[])`);
  const rows = await partRowsWithFindings(db, show, stored.rows);
  const byId = new Map(rows.map((row) => [row.part_id, row]));
  return partIds.map((id) => {
    const row = byId.get(id);
    if (!row) throw new Error(`Part ${id} has no row.`);
    return row;
  });
}
