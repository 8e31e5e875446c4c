import type { Category, Construction, MassSource, Origin, RowKind, RowState } from './states';

/** A finding as the table and the part page show it. */
export interface RowFinding {
  code: string;
  severity: 'problem' | 'warning' | 'note';
  message: string;
  count: number;
}

/**
 * One row of the parts table as the API answers it: the CSV's columns as JSON fields (SI, absent as null),
 * with `problems`, `revision` and what the screens need beside them.
 */
export interface PartRow {
  schema: string;
  show: string;
  sequence: string | null;
  shot: string | null;
  copy: string | null;
  asset: string;
  outside_id: string | null;
  category: Category;
  version: string;
  row: RowKind;
  part: string | null;
  body: string | null;
  joint: string | null;
  variant: string | null;
  scale: number;
  construction: Construction;
  material: string | null;
  density_kg_m3: number | null;
  areal_density_kg_m2: number | null;
  wall_m: number | null;
  target_mass_kg: number | null;
  area_m2: number | null;
  volume_m3: number | null;
  mass_kg: number | null;
  com_x_m: number | null;
  com_y_m: number | null;
  com_z_m: number | null;
  ixx_kg_m2: number | null;
  iyy_kg_m2: number | null;
  izz_kg_m2: number | null;
  ixy_kg_m2: number | null;
  ixz_kg_m2: number | null;
  iyz_kg_m2: number | null;
  i1_kg_m2: number | null;
  i2_kg_m2: number | null;
  i3_kg_m2: number | null;
  axes_quat_w: number | null;
  axes_quat_x: number | null;
  axes_quat_y: number | null;
  axes_quat_z: number | null;
  free_axes: string | null;
  space: string;
  up_axis: 'y' | 'z';
  numeric_error: number | null;
  adjusted: string | null;
  warnings: string | null;
  state: RowState;
  reason: string | null;
  locked_at: string | null;
  part_id: string | null;
  value_id: string | null;
  value_sha256: string | null;

  problems: RowFinding[];
  revision: number;
  /** What the mass comes from; null while there is none. */
  mass_source: MassSource | null;
  /** Who set the value last, from where and when (ISO 8601). */
  set_by: string | null;
  set_from: Origin | null;
  set_at: string | null;
  /** Box of the part in the asset's axes, metres: min xyz, max xyz; null for a blocked part without geometry. */
  bounds_m: [number, number, number, number, number, number] | null;
  /** Volume inside the control cage, m³. */
  cage_volume_m3: number | null;
  faces: number;
  max_valence: number;
  /** Shots that have the part locked, and how many of these are out of date. */
  locked_in: number;
  outdated_in: number;
}

/** Totals of an asset over its parts that have a mass, combined by the parallel-axis theorem; SI, asset axes. */
export interface AssetTotal {
  asset: string;
  category: Category;
  version: string;
  parts: number;
  without_mass: number;
  blocked: number;
  mass_kg: number | null;
  volume_m3: number | null;
  com_x_m: number | null;
  com_y_m: number | null;
  com_z_m: number | null;
  ixx_kg_m2: number | null;
  iyy_kg_m2: number | null;
  izz_kg_m2: number | null;
  ixy_kg_m2: number | null;
  ixz_kg_m2: number | null;
  iyz_kg_m2: number | null;
  i1_kg_m2: number | null;
  i2_kg_m2: number | null;
  i3_kg_m2: number | null;
  bounds_m: [number, number, number, number, number, number] | null;
  state: RowState;
}

/** Counts of a show's parts by state and category, for the progress rule and the filter chips. */
export interface PartCounts {
  total: number;
  assets: number;
  by_state: Partial<Record<RowState, number>>;
  by_category: Partial<Record<Category, number>>;
  mass_kg: number;
}

/** Answer of GET /api/v1/shows/{show}/parts. `assets` holds totals of the assets on this page; `counts` comes with the first page. */
export interface PartPage {
  items: PartRow[];
  assets: AssetTotal[];
  counts: PartCounts | null;
  /** The show's revision that the page was read at: what to hand in as changed_since the next time. */
  revision: number;
  next_cursor: string | null;
}
