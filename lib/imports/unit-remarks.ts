import { and, desc, eq, ne, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { geometryParts } from '@/db/schema/geometry-parts';
import { geometryRecords } from '@/db/schema/geometry-records';
import { shows } from '@/db/schema/shows';
import type { MeasuredPart } from '@/lib/engine/measured';
import { diagnoseSize, extentOf } from '@/lib/engine/size-habit';
import { LARGEST_ASSET_M, SMALLEST_ASSET_M, type Remark } from '@/lib/rules/import-answer';
import { METRES_PER } from '@/lib/rules/units';

/** A version may be that much larger or smaller than the one before; an asset than the show's middle one. */
const VERSION_SPREAD = 2;
const SHOW_SPREAD = 50;
/** So many other assets make a habit. */
const FEWEST_ASSETS = 5;

type PartBox = Pick<MeasuredPart, 'name' | 'bounds'>;

/** What was done to the file of a version just written, so that it stands in the show's unit and axes, and whether its size speaks for another unit all the same. */
export async function unitRemarks(tx: Transaction, version: { showId: string; assetId: string; recordId: string }): Promise<Remark[]> {
  const [placed] = await tx.select({ unitScale: geometryRecords.unitScale, turn: geometryRecords.turn }).from(geometryRecords).where(eq(geometryRecords.id, version.recordId));
  return [...(placed.unitScale === 1 ? [] : (['converted_unit'] as const)), ...(placed.turn === 'none' ? [] : (['turned_axis'] as const)), ...(await sizeRemarks(tx, version))];
}

/**
 * Whether the file of a version just written looks as if it were in another unit: too small or large for anything that a show films, unlike the version before by the
 * ratio of two units, or far from what the show's other assets measure (the median of their largest dimensions). One remark at most.
 */
async function sizeRemarks(tx: Transaction, { showId, assetId, recordId }: { showId: string; assetId: string; recordId: string }): Promise<Remark[]> {
  const parts = await boxesOf(tx, recordId);
  const extent = extentOf(parts);
  if (!extent || !(Math.max(...extent) > 0)) return [];
  const [show] = await tx.select({ unit: shows.linearUnit }).from(shows).where(eq(shows.id, showId));
  const metres = Math.max(...extent) * METRES_PER[show.unit];
  if (metres < SMALLEST_ASSET_M) return ['unit_too_small'];
  if (metres > LARGEST_ASSET_M) return ['unit_too_large'];
  const before = await sizeBefore(tx, assetId, recordId);
  if (before !== null) return diagnoseSize(parts, { usual: before, spread: VERSION_SPREAD, onlyUnits: true }) ? ['unit_unlike_before'] : [];
  const usual = await usualSize(tx, showId, assetId);
  return usual !== null && diagnoseSize(parts, { usual, spread: SHOW_SPREAD, onlyUnits: false }) ? ['unit_unlike_show'] : [];
}

async function boxesOf(tx: Transaction, recordId: string): Promise<PartBox[]> {
  const parts = await tx.select().from(geometryParts).where(eq(geometryParts.recordId, recordId));
  return parts.map(({ name, minX, minY, minZ, maxX, maxY, maxZ }) => ({ name, bounds: [minX, minY, minZ, maxX, maxY, maxZ] }));
}

/** Largest dimension of the asset's latest version of another measurement, show units; null where there is none. */
async function sizeBefore(tx: Transaction, assetId: string, recordId: string): Promise<number | null> {
  const [before] = await tx
    .select({ recordId: assetVersions.recordId })
    .from(assetVersions)
    .where(and(eq(assetVersions.assetId, assetId), ne(assetVersions.recordId, recordId)))
    .orderBy(desc(assetVersions.number), desc(assetVersions.take))
    .limit(1);
  const extent = before ? extentOf(await boxesOf(tx, before.recordId)) : null;
  return extent && Math.max(...extent);
}

/** Median of the largest dimensions of the show's other assets, show units; null where they are too few to make a habit. */
async function usualSize(tx: Transaction, showId: string, assetId: string): Promise<number | null> {
  const { rows } = await tx.execute<{ usual: number | null; assets: string }>(sql`
    select percentile_cont(0.5) within group (order by size) as usual, count(*) as assets
    from (
      select greatest(max(g.max_x) - min(g.min_x), max(g.max_y) - min(g.min_y), max(g.max_z) - min(g.min_z)) as size
      from (
        select distinct on (v.asset_id) v.asset_id, v.record_id from asset_versions v join assets a on a.id = v.asset_id
        where a.show_id = ${showId} and a.id <> ${assetId} and a.archived_at is null order by v.asset_id, v.number desc, v.take desc
      ) current
      join geometry_parts g on g.record_id = current.record_id
      group by current.asset_id
    ) sizes
    where size > 0`);
  return Number(rows[0].assets) < FEWEST_ASSETS ? null : rows[0].usual;
}
