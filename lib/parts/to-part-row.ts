import { CSV_SCHEMA } from '@/lib/rules/csv-columns';
import type { PartRow, RowFinding } from '@/lib/rules/part-row';
import { NO_LOCKS, type LockCounts } from './lock-counts';
import type { StoredRow } from './row-columns';

/** A stored row as the API answers it. What is not given is null. */
export function toPartRow(show: string, row: StoredRow, problems: RowFinding[], locks: LockCounts = NO_LOCKS): PartRow {
  return {
    schema: CSV_SCHEMA,
    show,
    sequence: null,
    shot: null,
    copy: null,
    asset: row.asset,
    outside_id: row.outside_id,
    category: row.category,
    version: row.version,
    row: row.row,
    part: row.part,
    body: row.body,
    joint: row.joint,
    variant: row.variant,
    scale: row.scale,
    construction: row.construction,
    material: row.material,
    density_kg_m3: row.density_kg_m3,
    areal_density_kg_m2: row.areal_density_kg_m2,
    wall_m: row.wall_m,
    target_mass_kg: row.target_mass_kg,
    area_m2: row.area_m2,
    volume_m3: row.volume_m3,
    mass_kg: row.mass_kg,
    com_x_m: row.com_x_m,
    com_y_m: row.com_y_m,
    com_z_m: row.com_z_m,
    ixx_kg_m2: row.ixx_kg_m2,
    iyy_kg_m2: row.iyy_kg_m2,
    izz_kg_m2: row.izz_kg_m2,
    ixy_kg_m2: row.ixy_kg_m2,
    ixz_kg_m2: row.ixz_kg_m2,
    iyz_kg_m2: row.iyz_kg_m2,
    i1_kg_m2: row.i1_kg_m2,
    i2_kg_m2: row.i2_kg_m2,
    i3_kg_m2: row.i3_kg_m2,
    axes_quat_w: row.axes_quat_w,
    axes_quat_x: row.axes_quat_x,
    axes_quat_y: row.axes_quat_y,
    axes_quat_z: row.axes_quat_z,
    free_axes: row.free_axes,
    space: row.space,
    up_axis: row.up_axis,
    numeric_error: row.numeric_error,
    adjusted: row.adjusted,
    warnings: row.warnings,
    state: row.state,
    reason: null,
    locked_at: null,
    part_id: row.part_id,
    value_id: row.value_id,
    value_sha256: row.value_sha256,
    problems,
    revision: row.revision,
    mass_source: row.mass_source,
    set_by: row.set_by,
    set_from: row.set_from,
    set_at: row.set_at,
    bounds_m: sixNumbers(row.bounds_m),
    cage_volume_m3: row.cage_volume_m3,
    faces: row.faces,
    max_valence: row.max_valence,
    ...locks,
  };
}

function sixNumbers(values: number[] | null): PartRow['bounds_m'] {
  if (values?.length !== 6) return null;
  const [minX, minY, minZ, maxX, maxY, maxZ] = values;
  return [minX, minY, minZ, maxX, maxY, maxZ];
}
