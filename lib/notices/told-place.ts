import { and, eq, isNull, type SQL } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { assets } from '@/db/schema/assets';
import { peopleTold } from '@/db/schema/people-told';
import { StudioError } from '@/lib/rules/studio-error';
import { findShot } from '@/lib/shots/find-shot';

/** A show, or one shot or asset of it, that people may ask to be told of. */
export interface Place {
  /** What it is called: the code of the shot, the asset or the show. */
  name: string;
  shotId: string | null;
  assetId: string | null;
}

/** The place that an input names. Errors: not_found for a shot or an asset that the show does not have. */
export async function findPlace(db: Executor, show: { id: string; code: string }, { shot, asset }: { shot?: string; asset?: string }): Promise<Place> {
  if (shot !== undefined) {
    const found = await findShot(db, show.id, shot);
    return { name: found.code, shotId: found.id, assetId: null };
  }
  if (asset === undefined) return { name: show.code, shotId: null, assetId: null };
  const [found] = await db.select({ id: assets.id, code: assets.code }).from(assets).where(and(eq(assets.showId, show.id), eq(assets.code, asset)));
  if (!found) throw new StudioError('not_found', `There is no asset ${asset}.`, { field: 'asset' });
  return { name: found.code, shotId: null, assetId: found.id };
}

/** Rows of people_told for exactly this place. */
export function atPlace(showId: string, { shotId, assetId }: Place): SQL | undefined {
  return and(
    eq(peopleTold.showId, showId),
    shotId === null ? isNull(peopleTold.shotId) : eq(peopleTold.shotId, shotId),
    assetId === null ? isNull(peopleTold.assetId) : eq(peopleTold.assetId, assetId),
  );
}
