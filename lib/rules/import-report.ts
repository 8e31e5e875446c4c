/** Schema of an import's report; columns are only ever added at the end. */
export const REPORT_SCHEMA = 'weighhouse-import-1';

export const REPORT_COLUMNS = [
  'schema',
  'show',
  'import',
  'file',
  'sha256',
  'bytes',
  'asset',
  'version',
  'take',
  'outcome',
  'part',
  'severity',
  'code',
  'message',
  'to_do',
  'count',
  'line',
  'column',
  'place',
] as const;

export const OUTCOMES = ['waiting', 'reading', 'measuring', 'measured', 'unchanged', 'unpacked', 'failed', 'cancelled'] as const;
export type Outcome = (typeof OUTCOMES)[number];

export type ReportSeverity = 'problem' | 'warning' | 'note';

/** One row of an import's report: a failure, a finding or a remark; a file with none of these has one row without a code. */
export interface ReportRow {
  schema: string;
  show: string;
  import: string;
  file: string;
  sha256: string;
  bytes: number;
  asset: string | null;
  version: string | null;
  take: number | null;
  outcome: Outcome;
  part: string | null;
  severity: ReportSeverity | null;
  code: string | null;
  message: string | null;
  /** What mends it, for whoever made the file. */
  to_do: string | null;
  /** Places that the finding has; the first is in `line`, `column` and `place`. */
  count: number | null;
  /** Counted from 1, in the file. */
  line: number | null;
  column: number | null;
  /** `face 12`, `edge 3 to 9`, `vertex 4`, numbered from 0 as in the cage, with the position in the file's own unit where it is known. */
  place: string | null;
}

/** How bad a row has to be to be in the report. */
export const REPORT_LEVELS = ['problem', 'warning', 'all'] as const;
export type ReportLevel = (typeof REPORT_LEVELS)[number];
