import { eq } from 'drizzle-orm';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { tellOfUnlock } from '@/lib/notices/tell-of-unlock';
import type { UnlockValuesInput } from '@/lib/rules/inputs/lock-values';
import { StudioError } from '@/lib/rules/studio-error';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { checkLocks, endLocks, findLocks } from './end-locks';
import { lockChange } from './lock-change';

/** Ends locks of a shot, all items or none, with the reason. Errors per item: not_found, already_unlocked. */
export async function unlockValues(context: Context, input: UnlockValuesInput): Promise<{ items: { lock: string; asset: string; part: string }[] }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'lockValues');
  return acting.db.transaction(async (tx) => {
    const { revision } = await lockShowValues(tx, show.id);
    const shot = await findShot(tx, show.id, input.shot);
    const ids = input.items.map((item) => item.lock);
    const found = await findLocks(tx, show.id, ids);
    const errors = checkLocks(ids, found, shot.id);
    if (errors.length > 0) {
      const conflict = errors.every((error) => error.code === 'already_unlocked');
      throw new StudioError(conflict ? 'conflict' : 'bad_input', `${errors[0].message} Nothing was unlocked.`, { field: `items.${errors[0].index}`, errors });
    }
    await endLocks(tx, ids, acting.actor.userId, input.reason);
    await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
    const ended = ids.map((id) => found.get(id)!);
    const items = ended.map((lock) => lockChange(lock, lock.approval_id, null));
    const eventId = await recordEvent(tx, acting, { showId: show.id, act: 'unlock-values', subject: shot.code, reason: input.reason, items });
    await tellOfUnlock(tx, acting, show, { eventId, reason: input.reason, ended: ended.map((lock) => ({ lock, becomes: null })) });
    return { items: ended.map((lock) => ({ lock: lock.id, asset: lock.asset, part: lock.part })) };
  });
}
