import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { CSV_COLUMNS, CSV_SCHEMA } from '@/lib/rules/csv-columns';
import type { ExportCells } from './export-pages';

/** A live lock's row, exactly as it was stored when it was locked. */
export interface LockedRow {
  lockId: string;
  partId: string;
  valueSha256: string;
  cells: ExportCells;
}

/**
 * The rows of a shot's live locks in the order of asset, body, part and copy. Rows are only ever read back, never made anew.
 * @param assets codes that a guest is limited to; null for all
 */
export async function readLockedRows(db: Executor, shotId: string, assets: readonly string[] | null): Promise<LockedRow[]> {
  const only = assets === null ? sql`` : sql`and a.asset = any(${sql.param(assets)}::text[])`;
  const { rows } = await db.execute<{ id: string; part_id: string; value_sha256: string; csv_schema: string; cells: string }>(sql`
    select l.id, l.part_id, l.value_sha256, l.csv_schema, l.cells from locks l join approvals a on a.id = l.approval_id
    where l.shot_id = ${shotId} and l.unlocked_at is null ${only}
    order by a.asset collate "C", coalesce(a.body, '') collate "C", a.part collate "C", l.copy collate "C"`);
  return rows.map((row) => {
    const cells = JSON.parse(row.cells) as ExportCells;
    if (row.csv_schema !== CSV_SCHEMA || cells.length !== CSV_COLUMNS.length) throw new Error(`Lock ${row.id} holds a row of ${row.csv_schema}, which this program does not know.`);
    return { lockId: row.id, partId: row.part_id, valueSha256: row.value_sha256, cells };
  });
}
