import { sql } from 'drizzle-orm';
import type { ValueFinding } from '@/db/schema/part-current';
import type { PartRow } from '@/lib/rules/part-row';

/** A row of part_current under the names of the API, as the driver reads it: no mapping in between, since pages are long and rows wide. */
export interface StoredRow extends Omit<PartRow, 'schema' | 'show' | 'sequence' | 'shot' | 'copy' | 'reason' | 'locked_at' | 'problems' | 'part' | 'part_id' | 'bounds_m' | 'locked_in' | 'outdated_in'>, Record<string, unknown> {
  part_id: string;
  asset_id: string;
  geometry_part_id: string | null;
  part: string;
  bounds_m: number[] | null;
  value_findings: ValueFinding[];
}

const COLUMNS = [
  'part_id', 'asset_id', 'geometry_part_id', 'asset', 'outside_id', 'category', 'version', '"row"', 'part', 'body', 'joint', 'variant', 'scale', 'construction',
  'material', 'density_kg_m3', 'areal_density_kg_m2', 'wall_m', 'target_mass_kg', 'area_m2', 'volume_m3', 'mass_kg', 'com_x_m', 'com_y_m', 'com_z_m',
  'ixx_kg_m2', 'iyy_kg_m2', 'izz_kg_m2', 'ixy_kg_m2', 'ixz_kg_m2', 'iyz_kg_m2', 'i1_kg_m2', 'i2_kg_m2', 'i3_kg_m2',
  'axes_quat_w', 'axes_quat_x', 'axes_quat_y', 'axes_quat_z', 'space', 'up_axis', 'numeric_error', 'adjusted', 'state', 'value_id', 'value_sha256',
  'revision', 'mass_source', 'set_by', 'set_from', 'cage_volume_m3', 'faces', 'max_valence', 'value_findings',
].map((name) => `part_current.${name}`);

/** The select list of a StoredRow, for queries over part_current. Empty texts read as null, times as ISO 8601. */
export const ROW_COLUMNS = sql.raw(
  [
    ...COLUMNS,
    `nullif(part_current.free_axes, '') as free_axes`,
    `nullif(part_current.warnings, '') as warnings`,
    `to_json(part_current.bounds_m) as bounds_m`,
    `to_char(part_current.set_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as set_at`,
  ].join(', '),
);
