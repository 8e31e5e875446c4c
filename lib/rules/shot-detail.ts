import type { OutdatedLock } from './outdated-lock';
import type { Standing } from './shot-words';
import type { Construction, MassSource, RowKind, ValueState } from './states';

/** An asset in a shot, with how many of it. */
export interface AssetInShot {
  asset: string;
  copies: number;
}

/** A shot of the list: what is in it and how far it is. */
export interface ShotEntry extends Standing {
  code: string;
  sequence: string;
  title: string | null;
  assets: AssetInShot[];
  overrides: number;
  /** `complete`, `2 missing`, `1 out of date` … */
  verdict: string;
}

/** Answer of GET /api/v1/shows/{show}/shots. */
export interface ShotPage {
  items: ShotEntry[];
  next_cursor: string | null;
}

/** A live lock as the shot's page shows it. Masses in kg, times ISO 8601. */
export interface ShotLock {
  id: string;
  value_id: string;
  version: string;
  mass_kg: number;
  locked_by: string;
  locked_at: string;
  approved_by: string;
  approved_at: string;
  /** It holds an override's value. */
  of_override: boolean;
  /** Names of those who took the locked row. */
  taken_by: string[];
}

/** A part's own value in the shot, as it was drafted. SI. */
export interface ShotOverride {
  reason: string;
  drafted_by: string;
  drafted_at: string;
  version: string;
  mass_kg: number | null;
  state: 'unset' | 'blocked' | 'measured' | 'approved';
  construction: Construction;
  mass_source: MassSource | null;
  target_mass_kg: number | null;
  density_kg_m3: number | null;
  material: string | null;
  areal_density_kg_m2: number | null;
  wall_m: number | null;
}

/** A part as it is now, outside the shot. */
export interface CurrentValue {
  version: string;
  state: ValueState;
  mass_kg: number | null;
}

/** A part of an asset and copy in a shot. */
export interface ShotSlot {
  shot: string;
  sequence: string;
  asset: string;
  copy: string | null;
  part: string;
  row: RowKind;
  part_id: string;
  lock: ShotLock | null;
  override: ShotOverride | null;
  /** Null where the current version does not have the part. */
  current: CurrentValue | null;
  /** The approved value that a lock would hold now: the override's, else the part's own; null while none is approved. */
  ready_value_id: string | null;
  /** Where the lock is out of date: the verdict and the value that it could be re-locked to. */
  outdated: OutdatedLock | null;
}

/** Somebody's download of the shot. */
export interface ShotPull {
  id: string;
  taken_by: string;
  /** Name of the token that took it; null for a browser. */
  token: string | null;
  taken_at: string;
  format: string;
  rows: number;
  sha256: string;
  /** It holds exactly the locks that stand now. */
  current: boolean;
}

/** What became of a part since somebody's last download. */
export interface ChangeSince {
  asset: string;
  copy: string | null;
  part: string;
  kind: 'added' | 'ended' | 'relocked';
  /** The differences in one line, of what was re-locked. */
  verdict: string | null;
  before_kg: number | null;
  after_kg: number | null;
  by: string;
  at: string;
  /** Of what was unlocked or re-locked. */
  reason: string | null;
}

export interface SinceLastPull {
  taken_at: string;
  sha256: string;
  changes: ChangeSince[];
}

export interface ShotDetail extends Standing {
  code: string;
  sequence: string;
  title: string | null;
  assets: AssetInShot[];
  slots: ShotSlot[];
  /** Newest first. */
  pulls: ShotPull[];
  /** Null where the viewer took nothing of this shot yet. */
  since: SinceLastPull | null;
}

/** One asset in one shot of a sequence. */
export interface SequenceCell extends Standing {
  copies: number;
  overrides: number;
}

export interface SequenceShot extends Standing {
  code: string;
  title: string | null;
  /** By asset code. */
  cells: Record<string, SequenceCell>;
}

export interface SequenceDetail extends Standing {
  sequence: string;
  /** Every asset of the sequence, in order. */
  assets: string[];
  shots: SequenceShot[];
  outdated_locks: OutdatedLock[];
}

/** What a list of shots would make, before it does. */
export interface ShotPlan {
  items: { code: string; sequence: string; fresh: boolean; adds: AssetInShot[] }[];
  errors: { index: number; message: string }[];
}

/** What a screen of shots may offer its reader. */
export interface ShotActs {
  may_edit: boolean;
  may_lock: boolean;
  may_draft: boolean;
}
