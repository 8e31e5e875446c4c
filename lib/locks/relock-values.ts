import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { tellOfUnlock } from '@/lib/notices/tell-of-unlock';
import type { RelockValuesInput } from '@/lib/rules/inputs/lock-values';
import { StudioError, type ItemError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { checkLockables } from './check-lockables';
import { checkLocks, endLocks, findLocks } from './end-locks';
import { findLockable, type Lockable } from './find-lockable';
import { lockChange } from './lock-change';
import { applyLocks, type LockAnswer } from './lock-values';

/**
 * Moves locks to other approved values of the same parts, in one shot or many: each old lock ends with the reason and a new one
 * begins, all items or none. Errors per item: as to unlock and to lock, and bad_input for a value of another part.
 */
export async function relockValues(context: Context, input: RelockValuesInput): Promise<LockAnswer> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'lockValues');
  return acting.db.transaction(async (tx) => {
    const at = await lockShowValues(tx, show.id);
    const ids = input.items.map((item) => item.lock);
    const locks = await findLocks(tx, show.id, ids);
    refuse(checkLocks(ids, locks, null));
    const replaced = input.items.map((item) => locks.get(item.lock)!);
    const found = await findLockable(tx, show.id, input.items.map((item, i) => ({ shotId: replaced[i].shot_id, copy: replaced[i].copy, approvalId: item.value_id })));
    refuse(checkLockables(input.items, found, new Set(ids)));
    refuse(
      found.flatMap((one, index) => (one!.part_id === replaced[index].part_id ? [] : [{ index, asset: replaced[index].asset, part: replaced[index].part, code: 'bad_input', message: `${input.items[index].value_id} is a value of ${one!.asset}/${one!.part}, not of ${replaced[index].asset}/${replaced[index].part}.` }])),
    );
    const moving = (found as Lockable[]).flatMap((one, i) => (one.approval_id === replaced[i].approval_id ? [] : [i]));
    if (moving.length > 0) {
      await endLocks(tx, moving.map((i) => ids[i]), acting.actor.userId, input.reason);
      const items = moving.map((i) => lockChange(replaced[i], replaced[i].approval_id, null));
      const eventId = await recordEvent(tx, acting, { showId: show.id, act: 'unlock-values', subject: moving.length === 1 ? replaced[moving[0]].shot : `${moving.length} locks`, reason: input.reason, items });
      await tellOfUnlock(tx, acting, show, { eventId, reason: input.reason, ended: moving.map((i) => ({ lock: replaced[i], becomes: found[i]!.approval_id })) });
    }
    return { items: await applyLocks(tx, acting, show, at, (found as Lockable[]).map((one, i) => (moving.includes(i) ? { ...one, lock_id: null } : one))) };
  });
}

function refuse(errors: readonly ItemError[]): void {
  if (errors.length === 0) return;
  const conflict = errors.every((error) => error.code === 'already_unlocked' || error.code === 'not_approved');
  throw new StudioError(conflict ? 'conflict' : 'bad_input', `${errors[0].message} Nothing was re-locked.`, { field: `items.${errors[0].index}`, errors: [...errors] });
}
