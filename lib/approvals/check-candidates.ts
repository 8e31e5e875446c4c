import type { Executor } from '@/db/client';
import type { Actor } from '@/lib/context';
import { partRowsById } from '@/lib/parts/part-rows-by-id';
import type { ApproveItem } from '@/lib/rules/inputs/approve-values';
import { STATE_WORDS } from '@/lib/rules/states';
import type { ItemError } from '@/lib/rules/studio-error';
import { isWithinTolerance } from '@/lib/rules/verdict';
import type { Show } from '@/lib/shows/get-show-access';
import { compareWithApprovals } from './compare-with-approvals';
import type { Candidate } from './find-candidates';

interface Check {
  show: Show;
  actor: Actor;
  items: readonly ApproveItem[];
  found: readonly (Candidate | null)[];
  carryOver: boolean;
}

/** Why items cannot be approved: at most one error an item. */
export async function checkCandidates(db: Executor, { show, actor, items, found, carryOver }: Check): Promise<ItemError[]> {
  const errors: ItemError[] = [];
  const seen = new Map<string, number>();
  const comparisons = carryOver ? await compareWithApprovals(db, found.flatMap((one) => (one && one.shotId === null ? [one.partId] : []))) : null;
  items.forEach((item, index) => {
    const one = found[index];
    const name = `${item.asset}/${item.part ?? item.body ?? ''}`;
    const add = (code: string, message: string): void => void errors.push({ index, asset: item.asset, part: item.part ?? item.body, code, message });
    const twin = one ? seen.get(`${one.partId} ${one.shotId ?? ''}`) : undefined;
    if (!one) return add('not_found', item.shot === undefined ? `${item.asset} has no part ${item.part ?? item.body ?? ''} in its current version.` : `${name} has no override in ${item.shot}.`);
    seen.set(`${one.partId} ${one.shotId ?? ''}`, index);
    if (twin !== undefined) return add('bad_input', `${name} is named twice (items ${twin} and ${index}).`);
    if (one.valueSha256 === null) return add('no_value', `${name} has no value to approve: ${STATE_WORDS[one.state]}.`);
    if (one.valueSha256 !== item.value_sha256) return add('changed_meanwhile', `${name} is another value by now.`);
    if (one.valueId !== null) return;
    if (one.setters[actor.userId] !== undefined && !show.selfApproval) return add('own_value', `You set ${name} since its last approval; somebody else approves it.`);
    if (!comparisons) return;
    const comparison = comparisons.get(one.partId);
    if (!comparison) return add('not_approved_before', `${name} was never approved, so nothing is carried over.`);
    if (!isWithinTolerance(comparison, show)) add('beyond_tolerance', `${name} moved more than the show's tolerance; approve it by itself.`);
  });
  return withCurrentRows(db, show.code, errors, found);
}

async function withCurrentRows(db: Executor, show: string, errors: ItemError[], found: readonly (Candidate | null)[]): Promise<ItemError[]> {
  const stale = errors.filter((error) => error.code === 'changed_meanwhile' && found[error.index]?.shotId === null);
  const rows = await partRowsById(db, show, stale.map((error) => found[error.index]!.partId));
  stale.forEach((error, i) => (error.current = rows[i]));
  return errors;
}
