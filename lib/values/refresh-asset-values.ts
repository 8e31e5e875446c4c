import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { assets } from '@/db/schema/assets';
import { shows } from '@/db/schema/shows';
import { StudioError } from '@/lib/rules/studio-error';
import { insertValueSetters } from './insert-value-setters';
import { loadValueInputs } from './load-value-inputs';
import { lockShowValues } from './lock-show-values';
import { takeUpOldNames } from './take-up-old-names';
import { writePartRows } from './write-part-rows';

/**
 * Brings the rows of an asset in part_current up to its current version (highest number, then highest take), within the
 * transaction of the change: geometry × newest setting × scale × the show's unit. Parts that the version no longer has leave
 * the table; their settings stay. Rows that change count up, and with them the show's revision.
 * Errors: not_found for an asset that does not exist.
 */
export async function refreshAssetValues(tx: Transaction, input: { assetId: string; importedBy: string }): Promise<{ written: number; removed: number }> {
  const { assetId, importedBy } = input;
  const [asset] = await tx.select({ showId: assets.showId }).from(assets).where(eq(assets.id, assetId));
  if (!asset) throw new StudioError('not_found', 'There is no such asset.');
  const { revision } = await lockShowValues(tx, asset.showId);
  await tx.execute(sql`
    insert into parts (asset_id, name)
    select ${assetId}::uuid, g.name from geometry_parts g
    where g.record_id = (select record_id from asset_versions where asset_id = ${assetId} order by number desc, take desc limit 1)
    order by g.ordinal on conflict do nothing`);
  await takeUpOldNames(tx, assetId);
  const parts = await loadValueInputs(tx, [assetId], null);
  const written = await writePartRows(tx, parts, revision + 1);
  await insertValueSetters(tx, [...written], { userId: importedBy, act: 'version' });
  const removed = await tx.execute(sql`
    delete from part_current where asset_id = ${assetId} and not (part_id = any(${sql.param(parts.map((part) => part.partId))}::uuid[]))`);
  const changes = { written: written.size, removed: removed.rowCount ?? 0 };
  if (changes.written + changes.removed > 0) await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, asset.showId));
  return changes;
}
