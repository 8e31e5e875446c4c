import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ShotRefInput } from '@/lib/rules/inputs/shot-ref';
import type { AssetInShot, ShotDetail } from '@/lib/rules/shot-detail';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { findChangesSince, findPulls } from './find-pulls';
import { findShot } from './find-shot';
import { findSlots } from './find-slots';

/** A shot with all that is in it, who took it, and what changed since the caller took it last. All of one moment. */
export async function getShot(context: Context, input: ShotRefInput): Promise<ShotDetail> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  return db.transaction(
    async (tx) => {
      const shot = await findShot(tx, show.id, input.shot);
      const slots = await findSlots(tx, show, { shotId: shot.id });
      const locks = new Set(slots.flatMap((slot) => slot.lock?.id ?? []));
      const outdated = new Set(slots.flatMap((slot) => slot.outdated?.lock ?? []));
      return {
        code: shot.code,
        sequence: shot.sequence,
        title: shot.title,
        assets: await assetsIn(tx, shot.id),
        locked: locks.size,
        missing: slots.filter((slot) => slot.lock === null).length,
        outdated: outdated.size,
        slots,
        pulls: await findPulls(tx, shot.id),
        since: await findChangesSince(tx, show, shot.id, actor.userId),
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

async function assetsIn(db: Executor, shotId: string): Promise<AssetInShot[]> {
  const { rows } = await db.execute<AssetInShot & Record<string, unknown>>(sql`
    select a.code as asset, count(*)::int as copies from shot_assets i join assets a on a.id = i.asset_id where i.shot_id = ${shotId} group by a.code order by a.code collate "C"`);
  return rows;
}
