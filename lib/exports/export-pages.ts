import { and, sql, type SQL } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { partCurrent } from '@/db/schema/part-current';
import { ROW_COLUMNS, type StoredRow } from '@/lib/parts/row-columns';
import { toPartRow } from '@/lib/parts/to-part-row';
import { CSV_COLUMNS } from '@/lib/rules/csv-columns';
import { exportCondition, type ExportSelection } from './export-selection';

const PAGE_ROWS = 1000;

/** One export row: the cells of CSV_COLUMNS in their order. */
export type ExportCells = (string | number | null)[];

/** A show's rows in the order of asset and part (by code point), a page at a time; the whole show never stands in memory. */
export async function* exportPages(db: Executor, show: { id: string; code: string }, selection: Omit<ExportSelection, 'guard'>, limit = Infinity): AsyncGenerator<ExportCells[]> {
  const condition = exportCondition(show.id, selection);
  const asset = sql`${partCurrent.asset} collate "C"`;
  const part = sql`${partCurrent.part} collate "C"`;
  let last: { asset: string; part: string } | null = null;
  for (let left = limit; left > 0; ) {
    const size = Math.min(PAGE_ROWS, left);
    const behind: SQL | undefined = last ? sql`(${asset}, ${part}) > (${last.asset}::text collate "C", ${last.part}::text collate "C")` : undefined;
    const { rows }: { rows: StoredRow[] } = await db.execute<StoredRow>(sql`select ${ROW_COLUMNS} from part_current where ${and(condition, behind)} order by ${asset}, ${part} limit ${size}`);
    if (rows.length === 0) return;
    yield rows.map((row) => {
      const fields = toPartRow(show.code, row, []);
      return CSV_COLUMNS.map((column) => fields[column.name]);
    });
    if (rows.length < size) return;
    last = rows[rows.length - 1];
    left -= rows.length;
  }
}
