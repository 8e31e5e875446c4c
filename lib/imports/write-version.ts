import { and, desc, eq } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { assetVersions } from '@/db/schema/asset-versions';
import { assets } from '@/db/schema/assets';
import { geometryRecords } from '@/db/schema/geometry-records';
import type { MeasureOptions } from '@/lib/engine/measured';
import type { Remark } from '@/lib/rules/import-answer';
import { versionLabel, type PlannedFile } from '@/lib/rules/import-plan';

export interface NewVersion {
  showId: string;
  /** Where the plan puts the file; its asset is known by now. */
  plan: PlannedFile & { asset: string };
  outsideId: string | null;
  recordId: string;
  sha256: string;
  options: MeasureOptions;
  besideSha256?: string;
  importFileId: string;
  createdBy: string;
}

export interface WrittenVersion {
  assetId: string;
  asset: string;
  versionId: string;
  label: string;
  /** Label of the version that was the current one before; null for a new asset. */
  before: string | null;
  /** False when the bytes and options are those of a version that is there: then nothing changed. */
  changed: boolean;
  remarks: Remark[];
}

/**
 * Puts a measured file under its asset: the asset is made when it is new, equal bytes and options change nothing, other
 * bytes under a number that exists become its next take, a name without number gets the highest + 1. Files of one asset
 * queue up behind the lock of its row.
 */
export async function writeVersion(tx: Transaction, input: NewVersion): Promise<WrittenVersion> {
  const asset = await lockAsset(tx, input);
  const existing = await tx
    .select({ id: assetVersions.id, number: assetVersions.number, take: assetVersions.take, label: assetVersions.label, record: geometryRecords })
    .from(assetVersions)
    .innerJoin(geometryRecords, eq(geometryRecords.id, assetVersions.recordId))
    .where(eq(assetVersions.assetId, asset.id))
    .orderBy(desc(assetVersions.number), desc(assetVersions.take));
  const current = existing.at(0);
  const latestTake = existing.find((version) => version.number === input.plan.version);
  const same = [current, latestTake].find((version) => version && isEqual(version.record, input));
  const base = { assetId: asset.id, asset: input.plan.asset, before: current?.label ?? null };
  if (same) return { ...base, versionId: same.id, label: same.label, changed: false, remarks: ['unchanged'] };
  const number = input.plan.version ?? (current ? current.number + 1 : 1);
  const take = (latestTake?.take ?? 0) + 1;
  const label = versionLabel(number, take);
  const [written] = await tx
    .insert(assetVersions)
    .values({ assetId: asset.id, number, take, label, recordId: input.recordId, importFileId: input.importFileId, createdBy: input.createdBy })
    .returning({ id: assetVersions.id });
  return { ...base, versionId: written.id, label, changed: true, remarks: remarksOf(input.plan, number, take, current?.number ?? null) };
}

async function lockAsset(tx: Transaction, { showId, plan, outsideId }: NewVersion): Promise<{ id: string }> {
  await tx.insert(assets).values({ showId, code: plan.asset, category: plan.category, outsideId, readName: plan.readName }).onConflictDoNothing();
  const [asset] = await tx
    .select({ id: assets.id, outsideId: assets.outsideId, readPlace: assets.readPlace })
    .from(assets)
    .where(and(eq(assets.showId, showId), eq(assets.code, plan.asset)))
    .for('no key update');
  const readPlace = withPlace(asset.readPlace, plan.place);
  if (readPlace !== asset.readPlace) await tx.update(assets).set({ readPlace }).where(eq(assets.id, asset.id));
  if (outsideId !== null && asset.outsideId !== outsideId) await tx.update(assets).set({ outsideId }).where(eq(assets.id, asset.id));
  return asset;
}

/** An asset whose files come from ever new folders keeps the newest of them. */
const MOST_PLACES = 20;

/** The folders that an asset's files came from, a line each, with those of one more file. */
function withPlace(places: string | null, place: string): string | null {
  const known = places?.split('\n') ?? [];
  return place === '' || known.includes(place) ? places : [...known, place].slice(-MOST_PLACES).join('\n');
}

function isEqual(record: typeof geometryRecords.$inferSelect, { sha256, options, besideSha256 = '' }: NewVersion): boolean {
  return (
    record.contentSha256 === sha256 &&
    record.besideSha256 === besideSha256 &&
    record.scheme === options.scheme &&
    record.boundary === options.boundary &&
    record.triangles === options.triangles &&
    record.creasing === options.creasing &&
    record.partsBy === options.partsBy &&
    record.weld === (options.weld === true) &&
    record.turnFaces === (options.turnFaces === true)
  );
}

function remarksOf(plan: PlannedFile, number: number, take: number, highest: number | null): Remark[] {
  const remarks: Remark[] = [];
  if (plan.qualified) remarks.push('qualified');
  if (plan.version === null) remarks.push('no_number');
  if (take > 1) remarks.push('next_take');
  else if (highest !== null && number > highest + 1) remarks.push('gap');
  if (highest !== null && number < highest) remarks.push('not_current');
  return remarks;
}
