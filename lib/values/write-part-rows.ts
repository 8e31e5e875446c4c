import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { approvalOf } from './approval-of';
import { computeValue, type ComputedValue } from './compute-value';
import type { LoadedPart } from './load-value-inputs';

/** Columns of part_current that a value fills, with their SQL types: the row's own bookkeeping is apart. */
export const PART_ROW_TYPES = {
  show_id: 'uuid',
  asset_id: 'uuid',
  version_id: 'uuid',
  geometry_part_id: 'uuid',
  setting_id: 'bigint',
  asset: 'text',
  outside_id: 'text',
  category: 'text',
  version: 'text',
  part: 'text',
  variant: 'text',
  scale: 'float8',
  construction: 'text',
  material: 'text',
  density_kg_m3: 'float8',
  areal_density_kg_m2: 'float8',
  wall_m: 'float8',
  target_mass_kg: 'float8',
  area_m2: 'float8',
  volume_m3: 'float8',
  mass_kg: 'float8',
  com_x_m: 'float8',
  com_y_m: 'float8',
  com_z_m: 'float8',
  ixx_kg_m2: 'float8',
  iyy_kg_m2: 'float8',
  izz_kg_m2: 'float8',
  ixy_kg_m2: 'float8',
  ixz_kg_m2: 'float8',
  iyz_kg_m2: 'float8',
  i1_kg_m2: 'float8',
  i2_kg_m2: 'float8',
  i3_kg_m2: 'float8',
  axes_quat_w: 'float8',
  axes_quat_x: 'float8',
  axes_quat_y: 'float8',
  axes_quat_z: 'float8',
  free_axes: 'text',
  space: 'text',
  up_axis: 'text',
  numeric_error: 'float8',
  warnings: 'text',
  state: 'text',
  value_sha256: 'text',
  value_id: 'uuid',
  last_approval_id: 'uuid',
  problem_codes: 'text[]',
  value_findings: 'jsonb',
  mass_source: 'text',
  set_by: 'text',
  set_from: 'text',
  set_at: 'timestamptz',
  bounds_m: 'float8[]',
  cage_volume_m3: 'float8',
  faces: 'integer',
  max_valence: 'integer',
} as const;

type ColumnName = keyof typeof PART_ROW_TYPES;
type RowColumns = Record<ColumnName, unknown>;

/** What comes with the version alone: no setting changes it. */
const OF_VERSION: ReadonlySet<string> = new Set<ColumnName>([
  'show_id', 'asset_id', 'version_id', 'geometry_part_id', 'asset', 'outside_id', 'category', 'version', 'part', 'scale', 'area_m2', 'space', 'up_axis', 'bounds_m', 'faces', 'max_valence',
]);

const names = Object.keys(PART_ROW_TYPES);
const ofSetting = names.filter((name) => !OF_VERSION.has(name));
const list = sql.raw(names.join(', '));
const typesOf = (columns: Record<string, string>) => sql.raw(Object.entries({ part_id: 'uuid', revision: 'integer', ...columns }).map(([name, type]) => `${name} ${type}`).join(', '));
const recordTypes = typesOf(PART_ROW_TYPES);
const settingTypes = typesOf(Object.fromEntries(Object.entries(PART_ROW_TYPES).filter(([name]) => !OF_VERSION.has(name))));
const settingAssignments = sql.raw(ofSetting.map((name) => `${name} = given.${name}`).join(', '));
const assignments = sql.raw(names.map((name) => `${name} = excluded.${name}`).join(', '));
const stored = sql.raw(names.map((name) => `part_current.${name}`).join(', '));
const given = sql.raw(names.map((name) => `excluded.${name}`).join(', '));

const CHUNK = 2500;

/**
 * Computes the parts' values and writes their rows set-wise. A row is written only where something in it differs, and only if its
 * revision is still the one that was loaded; its revision then rises by one. Answers the ids of the rows that were written.
 */
export async function writePartRows(tx: Transaction, parts: readonly LoadedPart[], showRevision: number): Promise<Set<string>> {
  const written = new Set<string>();
  for (let start = 0; start < parts.length; start += CHUNK) {
    const rows = parts.slice(start, start + CHUNK).map((part) => ({ part_id: part.partId, revision: part.revision ?? 1, ...partRowOf(part, computeValue(part)) }));
    // Doubles travel as shortest decimals, which PostgreSQL reads back as the same doubles.
    const result = await tx.execute<{ part_id: string }>(sql`
      insert into part_current (part_id, revision, changed_revision, ${list})
      select part_id, revision, ${showRevision}::bigint, ${list} from json_to_recordset(${JSON.stringify(rows)}::json) as given(${recordTypes})
      on conflict (part_id) do update set revision = part_current.revision + 1, changed_revision = excluded.changed_revision, updated_at = now(), ${assignments}
      where part_current.revision = excluded.revision and (${stored}) is distinct from (${given})
      returning part_id`);
    for (const row of result.rows) written.add(row.part_id);
  }
  return written;
}

/**
 * The same for parts whose settings alone changed and whose rows are there: narrower, and with one look at each index. A row that is
 * not at the loaded revision any more is left as it is.
 */
export async function updatePartRows(tx: Transaction, parts: readonly LoadedPart[], showRevision: number): Promise<Set<string>> {
  const written = new Set<string>();
  for (let start = 0; start < parts.length; start += CHUNK) {
    const rows = parts.slice(start, start + CHUNK).map((part) => {
      const row: Partial<RowColumns> = partRowOf(part, computeValue(part));
      return Object.fromEntries([['part_id', part.partId], ['revision', part.revision], ...Object.entries(row).filter(([name]) => !OF_VERSION.has(name))]);
    });
    const result = await tx.execute<{ part_id: string }>(sql`
      update part_current set revision = part_current.revision + 1, changed_revision = ${showRevision}::bigint, updated_at = now(), ${settingAssignments}
      from json_to_recordset(${JSON.stringify(rows)}::json) as given(${settingTypes})
      where part_current.part_id = given.part_id and part_current.revision = given.revision
      returning part_current.part_id`);
    for (const row of result.rows) written.add(row.part_id);
  }
  return written;
}

/** The row of a part under its columns' names, with the value that its inputs give. */
export function partRowOf(part: LoadedPart, value: ComputedValue): RowColumns {
  const { properties } = value;
  const [comX, comY, comZ] = properties?.comM ?? [null, null, null];
  const [ixx, iyy, izz, ixy, ixz, iyz] = properties?.inertiaKgM2 ?? [null, null, null, null, null, null];
  const [i1, i2, i3] = properties?.principalKgM2 ?? [null, null, null];
  const [w, x, y, z] = properties?.quatWxyz ?? [null, null, null, null];
  return {
    show_id: part.showId,
    asset_id: part.assetId,
    version_id: part.versionId,
    geometry_part_id: part.geometryPartId,
    setting_id: part.settingId,
    asset: part.asset,
    outside_id: part.outsideId,
    category: part.category,
    version: part.version,
    part: part.part,
    variant: part.setting.variant,
    scale: part.scale,
    construction: part.setting.construction,
    material: part.setting.material?.name ?? null,
    density_kg_m3: value.densityKgPerM3,
    areal_density_kg_m2: value.arealDensityKgPerM2,
    wall_m: part.setting.wallM,
    target_mass_kg: part.setting.targetMassKg,
    area_m2: value.areaM2,
    volume_m3: value.volumeM3,
    mass_kg: properties?.massKg ?? null,
    com_x_m: comX,
    com_y_m: comY,
    com_z_m: comZ,
    ixx_kg_m2: ixx,
    iyy_kg_m2: iyy,
    izz_kg_m2: izz,
    ixy_kg_m2: ixy,
    ixz_kg_m2: ixz,
    iyz_kg_m2: iyz,
    i1_kg_m2: i1,
    i2_kg_m2: i2,
    i3_kg_m2: i3,
    axes_quat_w: w,
    axes_quat_x: x,
    axes_quat_y: y,
    axes_quat_z: z,
    free_axes: properties?.freeAxes ?? '',
    space: part.asset,
    up_axis: part.upAxis,
    numeric_error: value.numericError,
    warnings: value.warningCodes.join(' '),
    value_sha256: value.valueSha256,
    ...approvalOf(value, part.approvals),
    problem_codes: value.problemCodes,
    value_findings: value.valueFindings,
    mass_source: value.massSource,
    set_by: part.setBy,
    set_from: part.setFrom,
    set_at: part.setAt,
    bounds_m: value.boundsM,
    cage_volume_m3: value.cageVolumeM3,
    faces: part.faces,
    max_valence: part.maxValence,
  };
}
