import { and, eq, isNull, sql } from 'drizzle-orm';
import { assets } from '@/db/schema/assets';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ShowRefInput } from '@/lib/rules/inputs/show-ref';
import { getShowAccess } from '@/lib/shows/get-show-access';

/** Codes of the assets that can be put into shots, in order. */
export async function listAssetCodes(context: Context, input: ShowRefInput): Promise<string[]> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const rows = await db
    .select({ code: assets.code })
    .from(assets)
    .where(and(eq(assets.showId, show.id), isNull(assets.archivedAt)))
    .orderBy(sql`${assets.code} collate "C"`);
  return rows.map((row) => row.code);
}
