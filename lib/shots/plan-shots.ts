import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { ShotPlan } from '@/lib/rules/shot-detail';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { assetsThere, checkShots, shotsThere, toWanted } from './wanted-shots';

/** What putShots would make of the same list, and why it would refuse it; changes nothing. */
export async function planShots(context: Context, input: PutShotsInput): Promise<ShotPlan> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'editShots');
  const wanted = input.items.map(toWanted);
  const there = await shotsThere(db, show.id, wanted);
  const assetIds = await assetsThere(db, show.id, wanted);
  const { rows } = await db.execute<{ shot_id: string; asset: string; copies: number }>(sql`
    select i.shot_id, a.code as asset, count(*)::int as copies from shot_assets i join assets a on a.id = i.asset_id
    where i.shot_id = any(${sql.param([...there.values()].map((shot) => shot.id))}::uuid[]) group by i.shot_id, a.code`);
  const held = new Map(rows.map((row) => [`${row.shot_id} ${row.asset}`, row.copies]));
  return {
    items: wanted.map(({ code, sequence, assets }) => {
      const known = there.get(code.toLowerCase());
      const adds = [...assets].map(([asset, copies]) => ({ asset, copies: copies - (held.get(`${known?.id} ${asset}`) ?? 0) }));
      return { code: known?.code ?? code, sequence, fresh: known === undefined, adds: adds.filter((add) => add.copies > 0) };
    }),
    errors: checkShots(wanted, there, assetIds).map(({ index, message }) => ({ index, message })),
  };
}
