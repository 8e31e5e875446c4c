import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { ShellLimits } from '@/lib/engine/measured';
import type { Category, Construction, Origin } from '@/lib/rules/states';
import { METRES_PER, type LinearUnit, type UpAxis } from '@/lib/rules/units';
import type { StandingApproval } from './approval-of';
import { PART_OF_GEOMETRY } from './part-of-geometry';
import type { RecordFinding, ValueInputs } from './value-inputs';

/** A part of an asset's current version with everything its row is made of. */
export interface LoadedPart extends ValueInputs {
  partId: string;
  showId: string;
  assetId: string;
  versionId: string;
  recordId: string;
  geometryPartId: string;
  settingId: number | null;
  /** Revision of the part's row; null where it has none yet. */
  revision: number | null;
  /** Of the part's own value (not of overrides), the newest first. */
  approvals: StandingApproval[];
  outsideId: string | null;
  category: Category;
  version: string;
  faces: number;
  maxValence: number;
  setBy: string | null;
  setFrom: Origin | null;
  /** As PostgreSQL writes it, with its microseconds. */
  setAt: string | null;
}

interface HeadRow {
  part_id: string;
  show_id: string;
  asset_id: string;
  version_id: string;
  record_id: string;
  geometry_part_id: string;
  setting_id: string | null;
  revision: number | null;
  asset: string;
  outside_id: string | null;
  category: Category;
  scale: number;
  version: string;
  linear_unit: LinearUnit;
  up_axis: UpAxis;
  part: string;
  /** Name of the part in the version's file. */
  file_part: string;
  faces: number;
  max_valence: number;
  min_x: number;
  min_y: number;
  min_z: number;
  max_x: number;
  max_y: number;
  max_z: number;
  content_sha256: string;
  scheme: string;
  boundary: string;
  triangles: string;
  creasing: string;
  parts_by: string;
  mended: string;
  engine_version: string;
  construction: Construction | null;
  target_mass_kg: number | null;
  density_kg_m3: number | null;
  areal_density_kg_m2: number | null;
  wall_m: number | null;
  variant: string | null;
  left_out: boolean | null;
  set_from: Origin | null;
  set_at: string | null;
  set_by_name: string | null;
  material_id: string | null;
  material_name: string | null;
  material_revision: number | null;
  material_density: number | null;
  material_areal_density: number | null;
  approvals: StandingApproval[];
}

/**
 * The named parts (or all parts) of the assets' current versions with geometry, newest setting and findings, in the order of asset and part.
 * A part that the current version does not have is not among them. Three queries, however many parts.
 * @param versionIds other versions to take the geometry from, one an asset, in place of the current ones
 * @param becomingHollow parts whose walls' polynomials are wanted though their settings are not hollow yet
 */
export async function loadValueInputs(db: Executor, assetIds: string[], partIds: string[] | null, versionIds: string[] | null = null, becomingHollow: readonly string[] = []): Promise<LoadedPart[]> {
  const onlyVersions = versionIds === null ? sql`` : sql`and id = any(${sql.param(versionIds)}::uuid[])`;
  const onlyParts = partIds === null ? sql`` : sql`and p.id = any(${sql.param(partIds)}::uuid[])`;
  const { rows: heads } = await db.execute<HeadRow & Record<string, unknown>>(sql`
    with current as (
      select distinct on (asset_id) id, asset_id, label, record_id from asset_versions
      where asset_id = any(${sql.param(assetIds)}::uuid[]) ${onlyVersions} order by asset_id, number desc, take desc
    )
    select p.id as part_id, a.show_id, a.id as asset_id, v.id as version_id, v.record_id, g.id as geometry_part_id,
      s.id as setting_id, c.revision, a.code as asset, a.outside_id, a.category, a.scale, v.label as version,
      w.linear_unit, w.up_axis, p.name as part, g.name as file_part, g.faces, g.max_valence, g.min_x, g.min_y, g.min_z, g.max_x, g.max_y, g.max_z,
      r.content_sha256, r.scheme, r.boundary, r.triangles, r.creasing, r.parts_by, r.engine_version,
      concat_ws(' ', case when r.weld then 'weld' end, case when r.turn_faces then 'turn_faces' end,
        case when r.unit_scale <> 1 then 'scaled_by_' || r.unit_scale end, case when r.turn <> 'none' then r.turn end, case when r.beside_sha256 <> '' then 'beside_' || r.beside_sha256 end) as mended,
      s.construction, s.target_mass_kg, s.density_kg_m3, s.areal_density_kg_m2, s.wall_m, s.variant, s.left_out, s.set_from, s.set_at,
      u.name as set_by_name, m.id as material_id, m.name as material_name, m.revision as material_revision,
      m.density_kg_m3 as material_density, m.areal_density_kg_m2 as material_areal_density, coalesce(y.approvals, '[]') as approvals
    from current v
    join assets a on a.id = v.asset_id
    join shows w on w.id = a.show_id
    join geometry_records r on r.id = v.record_id
    join geometry_parts g on g.record_id = v.record_id
    ${PART_OF_GEOMETRY}
    left join lateral (select * from settings where settings.part_id = p.id and settings.shot_id is null order by settings.id desc limit 1) s on true
    left join materials m on m.id = s.material_id
    left join users u on u.id = s.set_by
    left join part_current c on c.part_id = p.id
    left join lateral (
      select json_agg(json_build_object('id', approvals.id, 'valueSha256', approvals.value_sha256) order by approvals.ordinal desc) as approvals
      from approvals where approvals.part_id = p.id and approvals.shot_id is null
        and not exists (select 1 from withdrawals where withdrawals.approval_id = approvals.id)
    ) y on true
    where a.archived_at is null ${onlyParts}
    order by a.code collate "C", p.name collate "C"`);
  if (heads.length === 0) return [];
  const components = await loadComponents(db, heads, new Set(becomingHollow));
  const findings = await loadFindings(db, heads);
  return heads.map((head) => toLoadedPart(head, components.get(head.geometry_part_id) ?? [], findingsOf(findings, head)));
}

interface ComponentRow {
  geometry_part_id: string;
  volume: number;
  area: number;
  cage_volume: number;
  error_estimate: number;
  surface_error_estimate: number;
  /** Centroid 3, central second 6, surface centroid 3, surface central second 6. */
  moments: number[];
  hollow: number[] | null;
  hollow_limits: number[] | null;
}

/** Arrays travel as JSON, which the driver parses ten times faster than array literals and as exactly. */
async function loadComponents(db: Executor, heads: HeadRow[], becomingHollow: ReadonlySet<string>): Promise<Map<string, ValueInputs['components'][number][]>> {
  const hollow = heads.filter((head) => head.construction === 'hollow' || becomingHollow.has(head.part_id)).map((head) => head.geometry_part_id);
  const { rows } = await db.execute<ComponentRow & Record<string, unknown>>(sql`
    select geometry_part_id, volume, area, cage_volume, error_estimate, surface_error_estimate,
      to_json(centroid || central_second || surface_centroid || surface_central_second) as moments,
      case when geometry_part_id = any(${sql.param(hollow)}::uuid[]) then to_json(hollow) end as hollow,
      case when geometry_part_id = any(${sql.param(hollow)}::uuid[]) then to_json(hollow_limits) end as hollow_limits
    from geometry_components
    where geometry_part_id = any(${sql.param(heads.map((head) => head.geometry_part_id))}::uuid[])
    order by geometry_part_id, ordinal`);
  const byPart = new Map<string, ValueInputs['components'][number][]>();
  for (const row of rows) {
    const m = row.moments;
    const component = {
      solid: { volume: row.volume, centroid: [m[0], m[1], m[2]], centralSecond: [m[3], m[4], m[5], m[6], m[7], m[8]] },
      surface: { area: row.area, centroid: [m[9], m[10], m[11]], centralSecond: [m[12], m[13], m[14], m[15], m[16], m[17]] },
      hollow: row.hollow ? Float64Array.from(row.hollow) : null,
      hollowLimits: row.hollow_limits ? toShellLimits(row.hollow_limits) : null,
      errorEstimate: row.error_estimate,
      surfaceErrorEstimate: row.surface_error_estimate,
      cageVolume: row.cage_volume,
    } satisfies ValueInputs['components'][number];
    const list = byPart.get(row.geometry_part_id);
    if (list) list.push(component);
    else byPart.set(row.geometry_part_id, [component]);
  }
  return byPart;
}

function toShellLimits([curvature, x, y, z, e1, e2, e3]: number[]): ShellLimits {
  return { curvature, position: [x, y, z], error: [e1, e2, e3] };
}

/** Findings by record and part; those of a whole file stand under the empty name. */
type FindingsByRecord = Map<string, Map<string, RecordFinding[]>>;

async function loadFindings(db: Executor, heads: HeadRow[]): Promise<FindingsByRecord> {
  const records = [...new Set(heads.map((head) => head.record_id))];
  const { rows } = await db.execute<RecordFinding & { record_id: string; part: string | null } & Record<string, unknown>>(sql`
    select record_id, part, code, severity from findings
    where record_id = any(${sql.param(records)}::uuid[]) and severity <> 'note' order by record_id, ordinal`);
  const found: FindingsByRecord = new Map();
  for (const { record_id: recordId, part, code, severity } of rows) {
    const record = found.get(recordId) ?? new Map<string, RecordFinding[]>();
    found.set(recordId, record);
    record.set(part ?? '', [...(record.get(part ?? '') ?? []), { code, severity }]);
  }
  return found;
}

function findingsOf(found: FindingsByRecord, head: HeadRow): RecordFinding[] {
  const record = found.get(head.record_id);
  return [...(record?.get(head.file_part) ?? []), ...(record?.get('') ?? [])];
}

function toLoadedPart(head: HeadRow, components: LoadedPart['components'], findings: RecordFinding[]): LoadedPart {
  return {
    partId: head.part_id,
    showId: head.show_id,
    assetId: head.asset_id,
    versionId: head.version_id,
    recordId: head.record_id,
    geometryPartId: head.geometry_part_id,
    settingId: head.setting_id === null ? null : Number(head.setting_id),
    revision: head.revision,
    approvals: head.approvals,
    asset: head.asset,
    outsideId: head.outside_id,
    category: head.category,
    version: head.version,
    upAxis: head.up_axis,
    faces: head.faces,
    maxValence: head.max_valence,
    setBy: head.set_by_name,
    setFrom: head.set_from,
    setAt: head.set_at,
    record: {
      contentSha256: head.content_sha256,
      scheme: head.scheme,
      boundary: head.boundary,
      triangles: head.triangles,
      creasing: head.creasing,
      partsBy: head.parts_by,
      mended: head.mended,
      engineVersion: head.engine_version,
    },
    part: head.part,
    metresPerUnit: METRES_PER[head.linear_unit],
    scale: head.scale,
    setting: {
      construction: head.construction ?? 'solid',
      targetMassKg: head.target_mass_kg,
      densityKgPerM3: head.density_kg_m3,
      material:
        head.material_id === null
          ? null
          : {
              id: head.material_id,
              name: head.material_name ?? '',
              revision: head.material_revision ?? 0,
              densityKgPerM3: head.material_density,
              arealDensityKgPerM2: head.material_areal_density,
            },
      arealDensityKgPerM2: head.areal_density_kg_m2,
      wallM: head.wall_m,
      variant: head.variant,
      leftOut: head.left_out ?? false,
    },
    components,
    bounds: [head.min_x, head.min_y, head.min_z, head.max_x, head.max_y, head.max_z],
    findings,
  };
}
