import type { partCurrent } from '@/db/schema/part-current';
import { CSV_SCHEMA } from '@/lib/rules/csv-columns';
import type { PartRow, RowFinding } from '@/lib/rules/part-row';

export type StoredRow = typeof partCurrent.$inferSelect;

/** A row of part_current as the API answers it. What is not given is null. */
export function toPartRow(show: string, row: StoredRow, problems: RowFinding[]): PartRow {
  return {
    schema: CSV_SCHEMA,
    show,
    sequence: null,
    shot: null,
    copy: null,
    asset: row.asset,
    outside_id: row.outsideId,
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
    density_kg_m3: row.densityKgPerM3,
    areal_density_kg_m2: row.arealDensityKgPerM2,
    wall_m: row.wallM,
    target_mass_kg: row.targetMassKg,
    area_m2: row.areaM2,
    volume_m3: row.volumeM3,
    mass_kg: row.massKg,
    com_x_m: row.comXM,
    com_y_m: row.comYM,
    com_z_m: row.comZM,
    ixx_kg_m2: row.ixxKgM2,
    iyy_kg_m2: row.iyyKgM2,
    izz_kg_m2: row.izzKgM2,
    ixy_kg_m2: row.ixyKgM2,
    ixz_kg_m2: row.ixzKgM2,
    iyz_kg_m2: row.iyzKgM2,
    i1_kg_m2: row.i1KgM2,
    i2_kg_m2: row.i2KgM2,
    i3_kg_m2: row.i3KgM2,
    axes_quat_w: row.axesQuatW,
    axes_quat_x: row.axesQuatX,
    axes_quat_y: row.axesQuatY,
    axes_quat_z: row.axesQuatZ,
    free_axes: row.freeAxes || null,
    space: row.space,
    up_axis: row.upAxis,
    numeric_error: row.numericError,
    adjusted: row.adjusted,
    warnings: row.warnings || null,
    state: row.state,
    reason: null,
    locked_at: null,
    part_id: row.partId,
    value_id: row.valueId,
    value_sha256: row.valueSha256,
    problems,
    revision: row.revision,
    mass_source: row.massSource,
    set_by: row.setBy,
    set_from: row.setFrom,
    set_at: row.setAt?.toISOString() ?? null,
    bounds_m: sixNumbers(row.boundsM),
    cage_volume_m3: row.cageVolumeM3,
    faces: row.faces,
    max_valence: row.maxValence,
  };
}

function sixNumbers(values: number[] | null): PartRow['bounds_m'] {
  if (values?.length !== 6) return null;
  const [minX, minY, minZ, maxX, maxY, maxZ] = values;
  return [minX, minY, minZ, maxX, maxY, maxZ];
}
