import { eq } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { ActorContext, Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { LockValuesInput } from '@/lib/rules/inputs/lock-values';
import { StudioError } from '@/lib/rules/studio-error';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess, type Show } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { checkLockables } from './check-lockables';
import { findLockable, type Lockable } from './find-lockable';
import { insertLocks } from './insert-locks';
import { lockChange } from './lock-change';

export interface LockAnswer {
  items: { lock: string; shot: string; asset: string; part: string; copy: string; value_id: string }[];
}

/**
 * Locks approved values for a shot: all items or none. What is locked to the very value already keeps its lock.
 * Errors per item: not_found, bad_input, not_approved (taken back), not_in_shot, already_locked (to another value).
 */
export async function lockValues(context: Context, input: LockValuesInput): Promise<LockAnswer> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'lockValues');
  return acting.db.transaction(async (tx) => {
    const { revision, now } = await lockShowValues(tx, show.id);
    const shot = await findShot(tx, show.id, input.shot);
    const found = await findLockable(tx, show.id, input.items.map((item) => ({ shotId: shot.id, copy: item.copy, approvalId: item.value_id })));
    const errors = checkLockables(input.items, found);
    if (errors.length > 0) {
      const more = errors.length > 1 ? ` ${errors.length} items cannot be locked; nothing was.` : ' Nothing was locked.';
      const conflict = errors.every((error) => error.code === 'already_locked' || error.code === 'not_approved');
      throw new StudioError(conflict ? 'conflict' : 'bad_input', errors[0].message + more, { field: `items.${errors[0].index}`, errors });
    }
    return { items: await applyLocks(tx, acting, show, { revision, now }, found as Lockable[]) };
  });
}

/** Writes the locks that are not there yet, with their history; answers one per lockable, in order. The caller holds the show's values and has checked them. */
export async function applyLocks(tx: Transaction, acting: ActorContext, show: Show, { revision, now }: { revision: number; now: string }, lockables: readonly Lockable[]): Promise<LockAnswer['items']> {
  const fresh = lockables.filter((one) => one.lock_id === null);
  const ids = fresh.length > 0 ? await insertLocks(tx, show, acting.actor.userId, now, fresh) : [];
  if (fresh.length > 0) {
    await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
    const codes = [...new Set(fresh.map((one) => one.shot))];
    const subject = codes.length === 1 ? codes[0] : `${codes.length} shots`;
    const items = fresh.map((one) => lockChange(one, null, one.approval_id));
    await recordEvent(tx, acting, { showId: show.id, act: 'lock-values', subject, items });
  }
  const idOf = new Map(fresh.map((one, i) => [one, ids[i]]));
  return lockables.map((one) => ({ lock: one.lock_id ?? idOf.get(one)!, shot: one.shot, asset: one.asset, part: one.part, copy: one.copy, value_id: one.approval_id }));
}
