import { sql, type SQL } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { REMARKS, type ImportFileAnswer, type Remark } from '@/lib/rules/import-answer';
import type { ImportFileState } from '@/lib/rules/states';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';

export interface FileRow extends Record<string, unknown> {
  name: string;
  state: ImportFileState;
  sha256: string;
  byte_size: string;
  asset: string | null;
  version: string | null;
  parts: number | null;
  problems: number | null;
  remark: string | null;
  unpacked_into: number | null;
  error_code: string | null;
  error_message: string | null;
  error_line: number | null;
  error_column: number | null;
  error_excerpt: string | null;
  trouble: { attempt: number; message: string; again_at: string } | null;
  linear_unit: LinearUnit;
  scale: number | null;
  size: [number, number, number] | null;
}

const isRemark = (word: string): word is Remark => word in REMARKS;

/** Columns of a file as it is answered, of the tables in `FILE_TABLES`. */
export const FILE_COLUMNS = sql`f.name, f.state, f.sha256, f.byte_size, coalesce(a.code, f.asset_override) as asset, v.label as version, f.parts, f.problems, f.remark, f.unpacked_into,
  f.error_code, f.error_message, f.error_line, f.error_column, f.error_excerpt, w.linear_unit, a.scale,
  case when f.ended_at is null and f.attempts > 0 then (select json_build_object('attempt', t.attempt, 'message', t.message, 'again_at', t.again_at)
    from file_faults t where t.import_file_id = f.id and t.again_at is not null order by t.at desc limit 1) end as trouble,
  (select json_build_array(max(g.max_x) - min(g.min_x), max(g.max_y) - min(g.min_y), max(g.max_z) - min(g.min_z))
    from geometry_parts g where g.record_id = v.record_id and (g.max_x > g.min_x or g.max_y > g.min_y or g.max_z > g.min_z)) as size`;

export const FILE_TABLES = sql`import_files f
  join imports i on i.id = f.import_id
  join shows w on w.id = i.show_id
  left join assets a on a.id = f.asset_id
  left join asset_versions v on v.id = f.version_id`;

/** An import's files by name, all or those that `only` picks (an SQL condition on `f`, the file). */
export async function listImportFiles(db: Executor, importId: string, only: SQL = sql`true`): Promise<ImportFileAnswer[]> {
  const { rows } = await db.execute<FileRow>(sql`select ${FILE_COLUMNS} from ${FILE_TABLES} where f.import_id = ${importId} and ${only} order by f.name collate "C"`);
  return rows.map(toFileAnswer);
}

export function toFileAnswer(row: FileRow): ImportFileAnswer {
  const metres = METRES_PER[row.linear_unit] * (row.scale ?? 1);
  const size = row.size?.[0] == null ? null : row.size;
  return {
    name: row.name,
    state: row.state,
    asset: row.asset,
    version: row.version,
    parts: row.parts,
    problems: row.problems,
    remarks: (row.remark ?? '').split(' ').filter(isRemark),
    size_m: size ? [size[0] * metres, size[1] * metres, size[2] * metres] : null,
    sha256: row.sha256,
    bytes: Number(row.byte_size),
    error: row.error_code === null ? null : { code: row.error_code, message: row.error_message ?? '', line: row.error_line, column: row.error_column, excerpt: row.error_excerpt },
    trouble: row.trouble,
    unpacked_into: row.unpacked_into,
  };
}
