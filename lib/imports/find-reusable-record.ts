import { and, eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { assets } from '@/db/schema/assets';
import { statesSpace } from '@/lib/formats/mesh-extensions';
import { findGeometryRecord, type RecordKey } from './geometry-record';

/**
 * Id of an equal measurement that this show may use without reading the file again; null where there is none. A file whose format states unit and up axis has to be
 * held against the show's, so that another show's measurement of it is no reason to skip it.
 */
export async function findReusableRecord(db: Database, key: RecordKey, file: { name: string; showId: string }): Promise<string | null> {
  const known = await findGeometryRecord(db, key);
  if (known === null || !statesSpace(file.name)) return known;
  const [used] = await db
    .select({ id: assetVersions.id })
    .from(assetVersions)
    .innerJoin(assets, eq(assets.id, assetVersions.assetId))
    .where(and(eq(assetVersions.recordId, known), eq(assets.showId, file.showId)))
    .limit(1);
  return used ? known : null;
}
