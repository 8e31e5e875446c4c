import type { DifferencesAnswer } from './outdated-lock';

type Key =
  | 'mass_kg' | 'com_x_m' | 'com_y_m' | 'com_z_m' | 'ixx_kg_m2' | 'iyy_kg_m2' | 'izz_kg_m2' | 'ixy_kg_m2' | 'ixz_kg_m2' | 'iyz_kg_m2'
  | 'i1_kg_m2' | 'i2_kg_m2' | 'i3_kg_m2' | 'axes_quat_w' | 'axes_quat_x' | 'axes_quat_y' | 'axes_quat_z';

/** The numbers of one side: SI, the asset's axes, inertia about the centre of mass as matrix entries. */
export type ComparedNumbers = Record<Key, number> & {
  free_axes: '' | '12' | '23' | '123';
  /** Box, m: min xyz, max xyz. */
  bounds_m: number[] | null;
};

/** One of the two that are compared. */
export interface ComparedSide {
  /** What the address names it by: `current`, `approved`, `lock` or a version's label. */
  ref: string;
  /** Version whose surface is drawn. */
  version: string;
  /** The asset's scale then over its scale now: what the drawn surface is multiplied by. */
  mesh_scale: number;
  /** What it is, such as `v011` or `locked in fer_0020`. */
  name: string;
  /** Where its numbers come from. */
  about: string;
  /** Who answered for it and when; null where nobody did. */
  by: string | null;
  at: string | null;
  /** Null where it has no value. */
  numbers: ComparedNumbers | null;
  /** Of its surface; also where it has no mass. */
  volume_m3: number | null;
  area_m2: number | null;
}

/** Answer of GET /api/v1/shows/{show}/compare. */
export interface ComparisonAnswer {
  asset: string;
  /** Null: all parts of the asset together. */
  part: string | null;
  before: ComparedSide;
  after: ComparedSide;
  verdict: string;
  /** Null where one side has no value. */
  beyond_tolerance: boolean | null;
  differences: DifferencesAnswer | null;
  /** Diagonal of the box before, m: what a shift is a share of. */
  size_m: number | null;
  tolerances: { mass_percent: number; com_percent: number; moments_percent: number };
  /** What else can be compared: parts of the current version, versions newest first, whether there is a standing approval. */
  parts: string[];
  versions: string[];
  has_approval: boolean;
  lock: { id: string; shot: string; copy: string | null } | null;
}
