import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { geometryParts } from '@/db/schema/geometry-parts';
import { materials } from '@/db/schema/materials';
import { settings } from '@/db/schema/settings';
import { users } from '@/db/schema/users';
import { readQueueRows } from '@/lib/approvals/read-queue-rows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { PartRefInput } from '@/lib/rules/inputs/part-ref';
import type { DetailFinding, PartDetail, PartSetting, PartVersion } from '@/lib/rules/part-detail';
import { StudioError } from '@/lib/rules/studio-error';
import { METRES_PER } from '@/lib/rules/units';
import { findSlots } from '@/lib/shots/find-slots';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { findStoredFindings } from './find-stored-findings';
import { getCurrentAsset, measuredAs } from './get-current-asset';
import { lockCounts } from './lock-counts';
import { findingsOfRow } from './part-rows-with-findings';
import { ROW_COLUMNS, type StoredRow } from './row-columns';
import { toPartRow } from './to-part-row';

/** A part with its findings and their places, the asset's versions with this part's volumes, and everything that was ever set on it. */
export async function getPart(context: Context, input: PartRefInput): Promise<PartDetail> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { asset, record } = await getCurrentAsset(db, show.id, input.asset);
  const {
    rows: [stored],
  } = await db.execute<StoredRow>(sql`
    select ${ROW_COLUMNS} from part_current where asset_id = ${asset.id} and part_id = (
      select coalesce(merged_into, id) from parts where asset_id = ${asset.id} and name = ${input.part})`);
  if (!stored) throw new StudioError('not_found', `${asset.code} has no part ${input.part} in its current version.`);
  const ofRecord = (await findStoredFindings(db, record.id)).filter((one) => one.part === null || one.part === stored.part);
  const found = findingsOfRow(stored, ofRecord);
  const findings: DetailFinding[] = found.map((one) => ({
    ...one,
    places: ofRecord.find((other) => other.code === one.code && other.message === one.message)?.places ?? [],
  }));
  const [caps] = stored.geometry_part_id
    ? await db.select({ area: geometryParts.capAreaShare, volume: geometryParts.capVolumeShare }).from(geometryParts).where(eq(geometryParts.id, stored.geometry_part_id))
    : [];
  return {
    row: toPartRow(show.code, stored, found, (await lockCounts(db, [stored.part_id])).get(stored.part_id)),
    findings,
    versions: await partVersions(db, asset.id, stored.part_id, METRES_PER[show.linearUnit] * asset.scale),
    settings: await partSettings(db, stored.part_id),
    shots: await findSlots(db, show, { partId: stored.part_id }),
    approval: (await readQueueRows(db, show, actor, [{ partId: stored.part_id, shotId: null }]))[0] ?? null,
    measured_as: measuredAs(record),
    cap_area_share: caps?.area ?? 0,
    cap_volume_share: caps?.volume ?? 0,
  };
}

interface VersionRow extends Record<string, unknown> {
  label: string;
  created_at: string;
  name: string;
  faces: number | null;
  volume: number | null;
  cage_volume: number | null;
  area: number | null;
}

/** Newest first. `length` is metres per file unit at the asset's scale. */
async function partVersions(db: Executor, assetId: string, partId: string, length: number): Promise<PartVersion[]> {
  const { rows } = await db.execute<VersionRow>(sql`
    select v.label, v.created_at, u.name, g.faces, s.volume, s.cage_volume, s.area
    from asset_versions v
    join users u on u.id = v.created_by
    left join lateral (
      select g.id, g.faces from geometry_parts g join parts n on n.asset_id = v.asset_id and n.name = g.name
      where g.record_id = v.record_id and coalesce(n.merged_into, n.id) = ${partId} order by n.merged_into nulls first limit 1) g on true
    left join lateral (select sum(volume) as volume, sum(cage_volume) as cage_volume, sum(area) as area from geometry_components where geometry_part_id = g.id) s on true
    where v.asset_id = ${assetId} order by v.number desc, v.take desc`);
  const times = (value: number | null, factor: number): number | null => (value === null ? null : value * factor);
  return rows.map((row, i) => ({
    version: row.label,
    current: i === 0,
    created_at: new Date(row.created_at).toISOString(),
    created_by: row.name,
    present: row.faces !== null,
    faces: row.faces,
    volume_m3: times(row.volume, length ** 3),
    cage_volume_m3: times(row.cage_volume, length ** 3),
    area_m2: times(row.area, length ** 2),
  }));
}

async function partSettings(db: Executor, partId: string): Promise<PartSetting[]> {
  const rows = await db
    .select({ setting: settings, material: materials.name, setBy: users.name })
    .from(settings)
    .innerJoin(users, eq(users.id, settings.setBy))
    .leftJoin(materials, eq(materials.id, settings.materialId))
    .where(and(eq(settings.partId, partId), isNull(settings.shotId)))
    .orderBy(desc(settings.id))
    .limit(200);
  return rows.map(({ setting, material, setBy }) => ({
    construction: setting.construction,
    target_mass_kg: setting.targetMassKg,
    density_kg_m3: setting.densityKgPerM3,
    material,
    areal_density_kg_m2: setting.arealDensityKgPerM2,
    wall_m: setting.wallM,
    variant: setting.variant,
    left_out: setting.leftOut,
    set_by: setBy,
    set_from: setting.setFrom,
    set_at: setting.setAt.toISOString(),
  }));
}
