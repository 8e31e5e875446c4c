import type { DifferencesAnswer } from './outdated-lock';
import type { PartRow, RowFinding } from './part-row';
import type { SourceFields } from './source-words';
import type { Category, Origin, ValueState } from './states';

/** What the queue is narrowed to: all that waits, what somebody asked for, what is out of date, what is approved. */
export const QUEUE_FILTERS = ['waiting', 'asked', 'outdated', 'approved'] as const;
export type QueueFilter = (typeof QUEUE_FILTERS)[number];

export const QUEUE_FILTER_WORDS: Record<QueueFilter, string> = {
  waiting: 'Waiting',
  asked: 'Asked for',
  outdated: 'Out of date',
  approved: 'Approved',
};

/** An approval as a row shows it. */
export interface ShownApproval {
  value_id: string;
  version: string;
  approved_by: string;
  approved_at: string;
  note: string | null;
  mass_kg: number;
  com_m: readonly [number, number, number];
}

/** Somebody's open question for an approval. */
export interface ShownRequest {
  asked_by: string;
  asked_at: string;
  note: string | null;
  /** The reader asked it. */
  own: boolean;
  /** The value changed since it was asked for. */
  changed: boolean;
}

type Numbers = Pick<PartRow, 'mass_kg' | 'com_x_m' | 'com_y_m' | 'com_z_m' | 'ixx_kg_m2' | 'iyy_kg_m2' | 'izz_kg_m2' | 'bounds_m'>;

/** A value with all that a lead needs to answer for it; SI, the asset's axes. */
export interface QueueRow extends Numbers, SourceFields {
  part_id: string;
  asset: string;
  category: Category;
  version: string;
  row: 'part' | 'body' | 'added';
  part: string;
  /** Code of the shot whose override it is; null for the part's own value. */
  shot: string | null;
  /** Reason of the override. */
  reason: string | null;
  state: Extract<ValueState, 'measured' | 'outdated' | 'approved'>;
  value_sha256: string;
  /** The approval of this very value. */
  value_id: string | null;
  set_by: string | null;
  set_from: Origin | null;
  set_at: string | null;
  /** Names of those who changed an input since the last approval. */
  setters: readonly string[];
  /** The reader is one of them, and the show does not let them approve it. */
  own: boolean;
  request: ShownRequest | null;
  /** The newest approval that nobody took back. */
  last: ShownApproval | null;
  /** The differences from it in one line. */
  verdict: string;
  /** Null where nothing is compared. */
  beyond_tolerance: boolean | null;
  differences: DifferencesAnswer | null;
  /** Codes of the shots where the part is locked. */
  locked_shots: readonly string[];
  warnings: readonly RowFinding[];
}

export type QueueCounts = Record<QueueFilter, number>;

/** Answer of GET /api/v1/shows/{show}/approvals. `counts` comes with the first page. */
export interface QueuePage {
  items: QueueRow[];
  counts: QueueCounts | null;
  next_cursor: string | null;
}

/** A value that may be carried over: it moved less than the show's tolerance. */
export type CarryOverRow = Pick<QueueRow, 'asset' | 'part' | 'row' | 'value_sha256' | 'verdict'>;

/** Answer of GET /api/v1/shows/{show}/carry-over. */
export interface CarryOverAnswer {
  items: CarryOverRow[];
  /** Out of date values that stay: set by the reader, or moved beyond tolerance. */
  own: number;
  beyond_tolerance: number;
}

/** One key for each value of a show. */
export function queueKey(row: Pick<QueueRow, 'asset' | 'part' | 'row' | 'shot'>): string {
  return `${row.asset}/${row.row === 'part' ? '' : `${row.row}:`}${row.part}${row.shot === null ? '' : `@${row.shot}`}`;
}

/** The value as an item of a call names it, with the hash that was seen. */
export function approvalItem(row: Pick<QueueRow, 'asset' | 'part' | 'row' | 'shot' | 'value_sha256'>) {
  return {
    asset: row.asset,
    ...(row.row === 'body' ? { body: row.part } : { part: row.part }),
    value_sha256: row.value_sha256,
    ...(row.shot === null ? {} : { shot: row.shot }),
  };
}

/** Why the reader cannot approve the value; null where they can. */
export function whyNotApprovable(row: Pick<QueueRow, 'own' | 'value_id'>): string | null {
  if (row.value_id !== null) return 'It is approved.';
  if (row.own) return 'You set it since its last approval; somebody else approves it.';
  return null;
}

/** Values that one act may approve without looking at each: not the reader's own, not approved yet, no warnings. */
export function withoutWarnings<Row extends Pick<QueueRow, 'own' | 'value_id' | 'warnings'>>(rows: readonly Row[]): Row[] {
  return rows.filter((row) => whyNotApprovable(row) === null && row.warnings.length === 0);
}

/** The verdict with what hangs on it: `+9 %, 31 mm along +z (…), axes 1°; 3 locked shots`. */
export function verdictSentence(row: Pick<QueueRow, 'verdict' | 'locked_shots'>): string {
  const locked = row.locked_shots.length;
  return locked === 0 ? row.verdict : `${row.verdict}; ${locked.toLocaleString('en')} locked ${locked === 1 ? 'shot' : 'shots'}`;
}
