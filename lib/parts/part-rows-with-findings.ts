import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { PartRow, RowFinding } from '@/lib/rules/part-row';
import { NO_PROBLEM_OF_A_SHEET } from '@/lib/values/compute-value';
import { lockCounts } from './lock-counts';
import type { StoredRow } from './row-columns';
import { toPartRow } from './to-part-row';

interface FoundFinding extends RowFinding, Record<string, unknown> {
  part_id: string;
}

const SEVERITY_ORDER: Record<RowFinding['severity'], number> = { problem: 0, warning: 1, note: 2 };

/** Rows as the API answers them, each with the findings of its geometry and of its setting, problems first, and with its locks. Two queries for all. */
export async function partRowsWithFindings(db: Executor, show: string, rows: readonly StoredRow[]): Promise<PartRow[]> {
  if (rows.length === 0) return [];
  const { rows: found } = await db.execute<FoundFinding>(sql`
    select c.part_id, f.code, f.severity, f.message, f.count
    from part_current c
    join asset_versions v on v.id = c.version_id
    join findings f on f.record_id = v.record_id and (f.part = c.part or f.part is null)
    where c.part_id = any(${sql.param(rows.map((row) => row.part_id))}::uuid[])
    order by c.part_id, f.ordinal`);
  const byPart = new Map<string, RowFinding[]>();
  for (const { part_id: partId, code, severity, message, count } of found) {
    const list = byPart.get(partId);
    if (list) list.push({ code, severity, message, count });
    else byPart.set(partId, [{ code, severity, message, count }]);
  }
  const locks = await lockCounts(db, rows.map((row) => row.part_id));
  return rows.map((row) => toPartRow(show, row, findingsOfRow(row, byPart.get(row.part_id) ?? []), locks.get(row.part_id)));
}

/** What is a problem of a solid may be a plain fact about a sheet: then it is a note. */
export function findingsOfRow(row: Pick<StoredRow, 'construction' | 'value_findings'>, found: readonly RowFinding[]): RowFinding[] {
  const ofRecord = found.map((one) => (row.construction === 'sheet' && NO_PROBLEM_OF_A_SHEET.has(one.code) ? { ...one, severity: 'note' as const } : one));
  const ofSetting = row.value_findings.map((one) => ({ ...one, count: 1 }));
  return [...ofSetting, ...ofRecord].sort((a, b) => SEVERITY_ORDER[a.severity] - SEVERITY_ORDER[b.severity]);
}
