import { and, eq, isNotNull, or } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { assets } from '@/db/schema/assets';
import { geometryRecords } from '@/db/schema/geometry-records';
import { statesSpace } from '@/lib/formats/mesh-extensions';
import { isAsItIs, placingIn, type ShowSpace, type StatedSpace } from './file-space';
import { findGeometryRecord, type FileKey } from './geometry-record';

/**
 * Id of an equal measurement that this show may use without reading the file again; null where there is none. What a file of these bytes states of its unit and up
 * axis is known from any record of them, so that the record found is the one in this show's own space. Where no record knows, because the bytes are silent or were
 * measured before records kept it, only the show's own measurement will do.
 */
export async function findReusableRecord(db: Database, key: FileKey, file: { name: string; showId: string; space: ShowSpace }): Promise<string | null> {
  if (!statesSpace(file.name)) return findGeometryRecord(db, key);
  const stated = await findStatedSpace(db, key.sha256);
  if (stated) {
    const placing = placingIn(stated, file.space);
    return file.space.other === 'refuse' && !isAsItIs(placing) ? null : findGeometryRecord(db, { ...key, placing });
  }
  const known = await findGeometryRecord(db, key);
  if (known === null) return null;
  const [used] = await db
    .select({ id: assetVersions.id })
    .from(assetVersions)
    .innerJoin(assets, eq(assets.id, assetVersions.assetId))
    .where(and(eq(assetVersions.recordId, known), eq(assets.showId, file.showId)))
    .limit(1);
  return used ? known : null;
}

async function findStatedSpace(db: Database, sha256: string): Promise<StatedSpace | null> {
  const r = geometryRecords;
  const [found] = await db
    .select({ metresPerUnit: r.statedMetresPerUnit, upAxis: r.statedUpAxis })
    .from(r)
    .where(and(eq(r.contentSha256, sha256), or(isNotNull(r.statedMetresPerUnit), isNotNull(r.statedUpAxis))))
    .limit(1);
  return found ?? null;
}
