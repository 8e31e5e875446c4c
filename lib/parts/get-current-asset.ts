import { and, desc, eq, isNull } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { assets } from '@/db/schema/assets';
import { geometryRecords } from '@/db/schema/geometry-records';
import type { MeasuredAs } from '@/lib/rules/part-detail';
import { StudioError } from '@/lib/rules/studio-error';

export interface CurrentAsset {
  asset: typeof assets.$inferSelect;
  version: typeof assetVersions.$inferSelect;
  record: typeof geometryRecords.$inferSelect;
}

/**
 * An asset of a show with its current version (highest number, then take) and that version's record; throws not_found.
 * @param label of another version to take in place of the current one
 */
export async function getCurrentAsset(db: Executor, showId: string, code: string, label?: string): Promise<CurrentAsset> {
  const [found] = await db
    .select({ asset: assets, version: assetVersions, record: geometryRecords })
    .from(assets)
    .innerJoin(assetVersions, eq(assetVersions.assetId, assets.id))
    .innerJoin(geometryRecords, eq(geometryRecords.id, assetVersions.recordId))
    .where(and(eq(assets.showId, showId), eq(assets.code, code), isNull(assets.archivedAt), label === undefined ? undefined : eq(assetVersions.label, label)))
    .orderBy(desc(assetVersions.number), desc(assetVersions.take))
    .limit(1);
  if (!found) throw new StudioError('not_found', label === undefined ? `There is no asset ${code}.` : `${code} has no version ${label}.`);
  return found;
}

export function measuredAs(record: CurrentAsset['record']): MeasuredAs {
  return {
    scheme: record.scheme,
    boundary: record.boundary,
    creasing: record.creasing,
    triangles: record.triangles,
    parts_by: record.partsBy,
    weld: record.weld,
    turn_faces: record.turnFaces,
    engine_version: record.engineVersion,
    content_sha256: record.contentSha256,
  };
}
