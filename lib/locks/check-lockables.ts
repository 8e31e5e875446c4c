import type { ItemError } from '@/lib/rules/studio-error';
import type { Lockable } from './find-lockable';

/** What the item names as the value's owner, to be held against what the approval says. */
interface Named {
  asset?: string;
  part?: string;
  body?: string;
  value_id: string;
}

/** Why approvals cannot be locked: at most one error an item. `replacing` are locks that end in the same act. */
export function checkLockables(items: readonly Named[], found: readonly (Lockable | null)[], replacing: ReadonlySet<string> = new Set()): ItemError[] {
  const errors: ItemError[] = [];
  const seen = new Set<string>();
  items.forEach((item, index) => {
    const one = found[index];
    const named = item.part ?? item.body;
    const add = (code: string, message: string): void => void errors.push({ index, asset: item.asset ?? one?.asset, part: named ?? one?.part, code, message });
    if (!one) return add('not_found', `There is no approved value ${item.value_id} in this show.`);
    const key = `${one.shot_id} ${one.copy} ${one.part_id}`;
    const name = `${one.asset}/${one.part}${one.copy ? ` (copy ${one.copy})` : ''}`;
    if (item.asset !== undefined && (item.asset !== one.asset || (named !== one.part && named !== one.part_now) || (item.body === undefined) !== (one.row !== 'body'))) add('bad_input', `${item.value_id} is a value of ${one.asset}/${one.part}, not of ${item.asset}/${named}.`);
    else if (seen.has(key)) add('bad_input', `${name} is named twice for ${one.shot}.`);
    else if (one.withdrawn) add('not_approved', `The approval of ${name} was taken back.`);
    else if (one.only_shot_id !== null && one.only_shot_id !== one.shot_id) add('bad_input', `${name} is an override of another shot.`);
    else if (!one.in_shot) add('not_in_shot', `${one.shot} has no ${one.asset}${one.copy ? `, copy ${one.copy}` : ''}; put it into the shot first.`);
    else if (one.lock_id !== null && !replacing.has(one.lock_id) && one.locked_approval_id !== one.approval_id) add('already_locked', `${name} is locked in ${one.shot}. Unlock it first, or re-lock it.`);
    seen.add(key);
  });
  return errors;
}
