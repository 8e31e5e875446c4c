import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { DropOverrideInput } from '@/lib/rules/inputs/drop-override';
import { StudioError } from '@/lib/rules/studio-error';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';

/** Ends the override of a part in a shot; its locks and approvals stand. Errors: not_found where none stands. */
export async function dropOverride(context: Context, input: DropOverrideInput): Promise<{ dropped: number }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'draftOverride');
  return acting.db.transaction(async (tx) => {
    const { revision } = await lockShowValues(tx, show.id);
    const shot = await findShot(tx, show.id, input.shot);
    const { rows } = await tx.execute<{ id: string }>(sql`
      select coalesce(p.merged_into, p.id) as id from parts p join assets a on a.id = p.asset_id
      where a.show_id = ${show.id} and a.code = ${input.asset} and p.name = ${input.part}`);
    const ended = rows.length === 0 ? [] : await dropStanding(tx, [{ partId: rows[0].id, shotId: shot.id }], acting.actor.userId);
    if (ended.length === 0) throw new StudioError('not_found', `${input.asset}/${input.part} has no override in ${shot.code}.`);
    await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
    const items = [{ partId: rows[0].id, shotId: shot.id, field: `${shot.code}: override`, before: ended[0].reason, after: null }];
    await recordEvent(tx, acting, { showId: show.id, act: 'drop-override', subject: `${input.asset}/${input.part} in ${shot.code}`, reason: input.reason, items });
    return { dropped: ended.length };
  });
}

/** Ends the overrides that stand for these parts in these shots, and answers their reasons. */
export async function dropStanding(tx: Transaction, which: readonly { partId: string; shotId: string }[], by: string): Promise<{ reason: string }[]> {
  const { rows } = await tx.execute<{ reason: string }>(sql`
    update shot_overrides o set dropped_at = now(), dropped_by = ${by}::uuid
    from unnest(${sql.param(which.map((one) => one.partId))}::uuid[], ${sql.param(which.map((one) => one.shotId))}::uuid[]) as given(part_id, shot_id)
    where o.part_id = given.part_id and o.shot_id = given.shot_id and o.dropped_at is null
    returning o.reason`);
  return rows;
}
