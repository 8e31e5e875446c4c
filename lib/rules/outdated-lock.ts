import type { ValueState } from './states';

/** Differences of a value as the API answers them: changes relative, lengths in metres in the asset's axes, the rotation in degrees. */
export interface DifferencesAnswer {
  mass_change: number;
  com_shift_m: readonly [number, number, number];
  /** The shift over the diagonal of the part's box. */
  com_shift_of_size: number;
  principal_change: readonly [number, number, number];
  /** Of the inertia matrix, Frobenius norm. */
  inertia_change: number;
  /** Null where the axes are free. */
  rotation_deg: number | null;
}

interface OutdatedValue {
  version: string;
  value_id: string | null;
  value_sha256: string | null;
  mass_kg: number | null;
}

/** A live lock whose part has another value by now. */
export interface OutdatedLock {
  lock: string;
  shot: string;
  sequence: string;
  copy: string | null;
  asset: string;
  part: string | null;
  body: string | null;
  part_id: string;
  /** The value changed; the part has none any more; the current version does not have the part. */
  why: 'changed' | 'no_value' | 'absent';
  locked: OutdatedValue;
  /** Null where the part is absent; its value_id is null until somebody approves the value. */
  current: OutdatedValue | null;
  state: ValueState | null;
  /** The differences in one line. */
  verdict: string;
  beyond_tolerance: boolean;
  differences: DifferencesAnswer | null;
}
