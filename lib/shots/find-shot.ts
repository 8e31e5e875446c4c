import { and, eq, inArray, sql } from 'drizzle-orm';
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

/** Ids of the show's shots by lower-case code; codes that nobody knows are absent. */
export async function findShotIds(db: Executor, showId: string, codes: readonly string[]): Promise<Map<string, string>> {
  if (codes.length === 0) return new Map();
  const wanted = [...new Set(codes.map((code) => code.toLowerCase()))];
  const rows = await db
    .select({ id: shots.id, code: sql<string>`lower(${shots.code})` })
    .from(shots)
    .where(and(eq(shots.showId, showId), inArray(sql`lower(${shots.code})`, wanted)));
  return new Map(rows.map((row) => [row.code, row.id]));
}
