import { and, eq, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { shots } from '@/db/schema/shots';
import { StudioError } from '@/lib/rules/studio-error';

export type Shot = typeof shots.$inferSelect;

/** A shot of the show by its code, in any case of letters. Throws not_found. */
export async function findShot(db: Executor, showId: string, code: string): Promise<Shot> {
  const [shot] = await db
    .select()
    .from(shots)
    .where(and(eq(shots.showId, showId), sql`lower(${shots.code}) = lower(${code})`));
  if (!shot) throw new StudioError('not_found', `There is no shot ${code}.`);
  return shot;
}
