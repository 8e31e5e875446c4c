import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent, type ChangedField } from '@/lib/history/record-event';
import { dropStanding } from '@/lib/overrides/drop-overrides';
import type { RemoveFromShotInput } from '@/lib/rules/inputs/remove-from-shot';
import { assetInShot } from '@/lib/rules/shot-words';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { findShot } from './find-shot';

/**
 * Takes an asset out of a shot, all copies or the last so many; with the last copy its overrides there end. Refused as a conflict
 * while something of it is locked: unlock first. Errors: not_found where the shot does not have the asset.
 */
export async function removeFromShot(context: Context, input: RemoveFromShotInput): Promise<{ asset: string; removed: number }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'editShots');
  return acting.db.transaction(async (tx) => {
    await lockShowValues(tx, show.id);
    const shot = await findShot(tx, show.id, input.shot);
    const { rows: held } = await tx.execute<{ asset_id: string; copy: string; locked: number }>(sql`
      select i.asset_id, i.copy, (select count(*)::int from locks l where l.shot_id = i.shot_id and l.asset_id = i.asset_id and l.copy = i.copy and l.unlocked_at is null) as locked
      from shot_assets i join assets a on a.id = i.asset_id
      where i.shot_id = ${shot.id} and a.code = ${input.asset} collate "C"
      order by length(i.copy) desc, i.copy collate "C" desc`);
    if (held.length === 0) throw new StudioError('not_found', `${shot.code} has no ${input.asset}.`, { field: 'asset' });
    const going = held.slice(0, input.copies ?? held.length);
    const locked = going.reduce((sum, one) => sum + one.locked, 0);
    if (locked > 0) throw new StudioError('conflict', `${locked} of ${input.asset} ${locked === 1 ? 'is' : 'are'} locked in ${shot.code}. Unlock first; nothing was taken out.`, { field: 'asset' });
    const [{ asset_id: assetId }] = held;
    await tx.execute(sql`delete from shot_assets where shot_id = ${shot.id} and asset_id = ${assetId} and copy = any(${sql.param(going.map((one) => one.copy))}::text[])`);
    const history: ChangedField[] = going.map((one) => ({ shotId: shot.id, field: 'in_shot', before: `${shot.code}: ${assetInShot(input.asset, one.copy)}`, after: null }));
    if (going.length === held.length) {
      const { rows: parts } = await tx.execute<{ id: string; reason: string }>(sql`select p.id, o.reason from parts p join shot_overrides o on o.part_id = p.id where p.asset_id = ${assetId} and o.shot_id = ${shot.id} and o.dropped_at is null`);
      await dropStanding(tx, parts.map((part) => ({ partId: part.id, shotId: shot.id })), acting.actor.userId);
      for (const { id, reason } of parts) history.push({ partId: id, shotId: shot.id, field: `${shot.code}: override`, before: reason, after: null });
    }
    await recordEvent(tx, acting, { showId: show.id, act: 'remove-from-shot', subject: `${input.asset} in ${shot.code}`, items: history });
    return { asset: input.asset, removed: going.length };
  });
}
