import { sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Executor } from '@/db/client';
import { doubtsUnit, LOUD_REMARKS, REMARKS, type Remark } from '@/lib/rules/import-answer';
import { MENDS, mendOf } from '@/lib/rules/import-mends';
import { REPORT_SCHEMA, type Outcome, type ReportLevel, type ReportRow, type ReportSeverity } from '@/lib/rules/import-report';
import type { ImportFileState } from '@/lib/rules/states';
import { placeText } from './report-place';

const PAGE_FILES = 250;

interface StoredFile extends Record<string, unknown> {
  name: string;
  state: ImportFileState;
  sha256: string;
  byte_size: string;
  asset: string | null;
  version: string | null;
  take: number | null;
  remark: string | null;
  unpacked_into: number | null;
  error_code: string | null;
  error_message: string | null;
  error_line: number | null;
  error_column: number | null;
  findings: unknown;
}

const findingsShape = z.array(
  z.object({
    code: z.string(),
    severity: z.enum(['problem', 'warning', 'note']),
    message: z.string(),
    part: z.string().nullable(),
    count: z.number(),
    place: z
      .object({ face: z.number().nullable(), edge: z.tuple([z.number(), z.number()]).nullable(), vertex: z.number().nullable(), position: z.array(z.number().nullable()).nullable(), line: z.number().nullable() })
      .nullable(),
  }),
);

/**
 * An import's report a page at a time, in the order of file name (by code point), severity, and the engine's own order, so that it
 * comes out the same each time and never stands in memory whole.
 * @param level the least severe rows that are wanted; `all` has a row for every file
 */
export async function* reportPages(db: Executor, { show, importId, level }: { show: string; importId: string; level: ReportLevel }): AsyncGenerator<ReportRow[]> {
  let last: string | null = null;
  for (;;) {
    const { rows }: { rows: StoredFile[] } = await db.execute<StoredFile>(sql`
      select f.name, f.state, f.sha256, f.byte_size, coalesce(a.code, f.asset_override) as asset, v.label as version, v.take, f.remark, f.unpacked_into,
        f.error_code, f.error_message, f.error_line, f.error_column,
        coalesce((select json_agg(json_build_object('code', n.code, 'severity', n.severity, 'message', n.message, 'part', n.part, 'count', n.count, 'place', n.places -> 0)
          order by n.severity = 'note', n.severity, n.ordinal) from findings n where n.record_id = v.record_id), '[]'::json) as findings
      from import_files f left join assets a on a.id = f.asset_id left join asset_versions v on v.id = f.version_id
      where f.import_id = ${importId} and (${last}::text is null or f.name collate "C" > ${last}::text collate "C")
      order by f.name collate "C" limit ${PAGE_FILES}`);
    if (rows.length === 0) return;
    yield rows.flatMap((file) => rowsOf(file, { show, importId }, level));
    if (rows.length < PAGE_FILES) return;
    last = rows[rows.length - 1].name;
  }
}

const RANK: Record<ReportSeverity, number> = { problem: 0, warning: 1, note: 2 };
const WORST: Record<ReportLevel, number> = { problem: 0, warning: 1, all: 2 };

function rowsOf(file: StoredFile, { show, importId }: { show: string; importId: string }, level: ReportLevel): ReportRow[] {
  const base: ReportRow = {
    schema: REPORT_SCHEMA,
    show,
    import: importId,
    file: file.name,
    sha256: file.sha256,
    bytes: Number(file.byte_size),
    asset: file.asset,
    version: file.version,
    take: file.take,
    outcome: outcomeOf(file),
    ...{ part: null, severity: null, code: null, message: null, to_do: null, count: null, line: null, column: null, place: null },
  };
  const said = [...failureOf(file), ...findingsOf(file), ...remarksOf(file)]
    .filter((row) => RANK[row.severity] <= WORST[level])
    .sort((a, b) => RANK[a.severity] - RANK[b.severity])
    .map((row) => ({ ...base, ...row, to_do: MENDS[mendOf(row.code)].act }));
  return said.length === 0 && level === 'all' ? [base] : said;
}

type Said = Partial<ReportRow> & { code: string; severity: ReportSeverity };

function failureOf(file: StoredFile): Said[] {
  if (file.error_code === null || file.error_code === 'cancelled') return [];
  return [{ severity: 'problem', code: file.error_code, message: file.error_message, line: file.error_line, column: file.error_column }];
}

function findingsOf(file: StoredFile): Said[] {
  return findingsShape.parse(file.findings).map(({ place, ...finding }) => ({ ...finding, line: place?.line ?? null, place: place === null ? null : placeText(place) }));
}

function remarksOf(file: StoredFile): Said[] {
  const remarks = (file.remark ?? '').split(' ').filter((word): word is Remark => word in REMARKS);
  return remarks.map((code) => ({ severity: doubtsUnit(code) || LOUD_REMARKS.includes(code) ? 'warning' : 'note', code, message: REMARKS[code] }));
}

function outcomeOf(file: StoredFile): Outcome {
  if (file.state === 'queued') return 'waiting';
  if (file.state === 'failed') return file.error_code === 'cancelled' ? 'cancelled' : 'failed';
  if (file.state !== 'done') return file.state;
  if (file.unpacked_into !== null) return 'unpacked';
  return (file.remark ?? '').split(' ').includes('unchanged') ? 'unchanged' : 'measured';
}
