import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { AssetRenames } from '@/lib/rules/part-rename';
import { matchRenames, type RenameMatch } from './match-renames';
import { partShape, type ShapeComponent } from './part-shape';

/** A part of an asset whose current version both lacks parts and brought some, with what hangs on it. */
export interface SeenPart extends Record<string, unknown> {
  part_id: string;
  asset_id: string;
  asset: string;
  /** Current version of the asset. */
  version_id: string;
  version: string;
  part: string;
  /** Versions of the asset count from 1 in their order. */
  first: number;
  last: number;
  absent: boolean;
  /** Label of its last version where it is absent, of its first where it arrived. */
  label: string;
  faces: number;
  geometry_part_id: string;
  has_setting: boolean;
  approvals: number;
  locks: number;
  overrides: number;
}

export interface FoundRenames extends AssetRenames {
  assetId: string;
  versionId: string;
  parts: SeenPart[];
  matches: RenameMatch[];
}

/**
 * Parts that the assets' current versions lack, parts that came after those were last seen, and which of them have one geometry. Assets
 * without both are left out. By asset.
 */
export async function findRenames(db: Executor, assetIds: readonly string[]): Promise<FoundRenames[]> {
  const seen = await findSeenParts(db, assetIds);
  if (seen.length === 0) return [];
  const shapes = await loadShapes(db, seen);
  const refused = await findRefused(db, seen);
  const assets = new Map<string, SeenPart[]>();
  for (const part of seen) assets.set(part.asset_id, [...(assets.get(part.asset_id) ?? []), part]);
  return [...assets.values()].map((parts) => toRenames(parts, shapes, refused));
}

function toRenames(parts: SeenPart[], shapes: ReadonlyMap<string, ShapeComponent[]>, refused: ReadonlySet<string>): FoundRenames {
  const [{ asset, asset_id: assetId, version, version_id: versionId }] = parts;
  const shaped = parts.map((part) => ({ id: part.part_id, name: part.part, version: part.absent ? part.last : part.first, shape: partShape(part.faces, shapes.get(part.geometry_part_id) ?? []), absent: part.absent }));
  const matches = matchRenames(shaped.filter((part) => part.absent), shaped.filter((part) => !part.absent), refused);
  const nameOf = new Map(parts.map((part) => [part.part_id, part.part]));
  return {
    asset,
    version,
    assetId,
    versionId,
    parts,
    matches,
    kept_apart: [...refused].flatMap((pair) => {
      const [part, becomes] = pair.split(' ').map((id) => nameOf.get(id));
      return part !== undefined && becomes !== undefined ? [{ part, becomes }] : [];
    }),
    proposals: matches.map(({ from, to, fit, others }) => ({ part: nameOf.get(from)!, becomes: nameOf.get(to)!, fit, others })),
    absent: parts.filter((part) => part.absent).map(({ part, label, has_setting, approvals, locks }) => ({ part, last_version: label, has_setting, approvals, locks })),
    arrived: parts.filter((part) => !part.absent).map(({ part, label, has_setting, approvals, locks, overrides }) => ({ part, first_version: label, has_setting, approvals, locks, overrides })),
  };
}

async function findSeenParts(db: Executor, assetIds: readonly string[]): Promise<SeenPart[]> {
  const { rows } = await db.execute<SeenPart>(sql`
    with v as (
      select id, asset_id, record_id, label, row_number() over (partition by asset_id order by number, take)::integer as place, count(*) over (partition by asset_id)::integer as newest
      from asset_versions where asset_id = any(${sql.param(assetIds)}::uuid[])
    ), seen as (
      select p.id, p.asset_id, p.name, v.newest, min(v.place) as first, max(v.place) as last
      from v join geometry_parts g on g.record_id = v.record_id
      join parts n on n.asset_id = v.asset_id and n.name = g.name
      join parts p on p.id = coalesce(n.merged_into, n.id)
      where v.newest > 1 group by p.id, v.newest
    ), bounds as (
      select asset_id, min(last) filter (where last < newest) as lost, max(first) filter (where last = newest) as came from seen group by asset_id
    ), chosen as (
      select seen.*, last < newest as absent, case when last < newest then last else first end as shown
      from seen join bounds b using (asset_id)
      where b.came > b.lost and case when last < newest then last < b.came else first > b.lost end
    )
    select c.id as part_id, c.asset_id, a.code as asset, top.id as version_id, top.label as version, c.name as part, c.first, c.last, c.absent, v.label, g.id as geometry_part_id, g.faces,
      exists (select 1 from settings s where s.part_id = c.id and s.shot_id is null) as has_setting,
      (select count(*)::integer from approvals y where y.part_id = c.id and not exists (select 1 from withdrawals w where w.approval_id = y.id)) as approvals,
      (select count(*)::integer from lock_claims k where k.part_id = c.id and k.released_at is null) as locks,
      (select count(*)::integer from shot_overrides o where o.part_id = c.id and o.dropped_at is null) as overrides
    from chosen c
    join assets a on a.id = c.asset_id and a.archived_at is null
    join v top on top.asset_id = c.asset_id and top.place = c.newest
    join v on v.asset_id = c.asset_id and v.place = c.shown
    join lateral (
      select g.id, g.faces from geometry_parts g join parts n on n.asset_id = c.asset_id and n.name = g.name
      where g.record_id = v.record_id and coalesce(n.merged_into, n.id) = c.id order by n.merged_into nulls first limit 1) g on true
    order by a.code collate "C", c.name collate "C"`);
  return rows;
}

async function loadShapes(db: Executor, seen: readonly SeenPart[]): Promise<Map<string, ShapeComponent[]>> {
  const { rows } = await db.execute<{ id: string; components: ShapeComponent[] }>(sql`
    select geometry_part_id as id, json_agg(json_build_object('volume', volume, 'centroid', centroid, 'centralSecond', central_second,
      'area', area, 'surfaceCentroid', surface_centroid, 'surfaceCentralSecond', surface_central_second) order by ordinal) as components
    from geometry_components where geometry_part_id = any(${sql.param(seen.map((part) => part.geometry_part_id))}::uuid[]) group by geometry_part_id`);
  return new Map(rows.map((row) => [row.id, row.components]));
}

/** Pairs that a person kept apart, as `from to` of ids. */
async function findRefused(db: Executor, seen: readonly SeenPart[]): Promise<Set<string>> {
  const { rows } = await db.execute<{ pair: string }>(sql`
    select part_id || ' ' || arrived_id as pair from part_renames
    where decision = 'refused' and asset_id = any(${sql.param([...new Set(seen.map((part) => part.asset_id))])}::uuid[])`);
  return new Set(rows.map((row) => row.pair));
}
