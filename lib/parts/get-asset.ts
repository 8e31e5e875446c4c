import { desc, eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { geometryRecords } from '@/db/schema/geometry-records';
import { importFiles } from '@/db/schema/import-files';
import { users } from '@/db/schema/users';
import { readQueueRows } from '@/lib/approvals/read-queue-rows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { AssetRefInput } from '@/lib/rules/inputs/part-ref';
import type { AssetDetail, AssetVersionEntry } from '@/lib/rules/part-detail';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { assetTotals } from './asset-totals';
import { findStoredFindings } from './find-stored-findings';
import { getCurrentAsset, measuredAs } from './get-current-asset';
import { partRowsWithFindings } from './part-rows-with-findings';
import { ROW_COLUMNS, type StoredRow } from './row-columns';

/** An asset with its totals, the rows of its parts, the findings of its current version with their places, and its versions. */
export async function getAsset(context: Context, input: AssetRefInput): Promise<AssetDetail> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { asset, record } = await getCurrentAsset(db, show.id, input.asset);
  const [total] = await assetTotals(db, [asset.id]);
  if (!total) throw new StudioError('not_found', `${asset.code} has no parts.`);
  const stored = await db.execute<StoredRow>(sql`select ${ROW_COLUMNS} from part_current where asset_id = ${asset.id} order by part collate "C"`);
  return {
    total,
    scale: asset.scale,
    outside_id: asset.outsideId,
    parts: await partRowsWithFindings(db, show.code, stored.rows),
    findings: await findStoredFindings(db, record.id),
    versions: await assetVersionEntries(db, asset.id),
    approvals: await readQueueRows(db, show, actor, stored.rows.map((row) => ({ partId: row.part_id, shotId: null }))),
    measured_as: measuredAs(record),
  };
}

/** Newest first. */
async function assetVersionEntries(db: Executor, assetId: string): Promise<AssetVersionEntry[]> {
  const rows = await db
    .select({ label: assetVersions.label, createdAt: assetVersions.createdAt, createdBy: users.name, faces: geometryRecords.faces, file: importFiles.name })
    .from(assetVersions)
    .innerJoin(users, eq(users.id, assetVersions.createdBy))
    .innerJoin(geometryRecords, eq(geometryRecords.id, assetVersions.recordId))
    .leftJoin(importFiles, eq(importFiles.id, assetVersions.importFileId))
    .where(eq(assetVersions.assetId, assetId))
    .orderBy(desc(assetVersions.number), desc(assetVersions.take));
  return rows.map((row, i) => ({
    version: row.label,
    current: i === 0,
    created_at: row.createdAt.toISOString(),
    created_by: row.createdBy,
    faces: row.faces,
    file: row.file,
  }));
}
