import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { tellOfWithdrawals } from '@/lib/notices/tell-of-approvals';
import type { WithdrawApprovalsInput } from '@/lib/rules/inputs/withdraw-approvals';
import { StudioError, type ItemError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { refreshApprovalStates } from './refresh-approval-states';

interface Standing extends Record<string, unknown> {
  id: string;
  part_id: string;
  shot_id: string | null;
  asset: string;
  part: string;
  withdrawn: boolean;
  /** Codes of the shots where a live lock uses it. */
  locked_in: string[];
}

/**
 * Takes approvals back, all items or none. The approval stands in the history; the part's value is judged by what remains.
 * Errors per item: not_found, already_withdrawn, locked (a live lock uses it; the shots are named).
 */
export async function withdrawApprovals(context: Context, input: WithdrawApprovalsInput): Promise<{ items: { asset: string; part: string; value_id: string }[] }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'approveValues');
  return acting.db.transaction(async (tx) => {
    const { revision } = await lockShowValues(tx, show.id);
    const found = await findStanding(tx, show.id, input.items.map((item) => item.value_id));
    const errors = checkItems(input, found);
    if (errors.length > 0) {
      const more = errors.length > 1 ? ` ${errors.length} approvals cannot be taken back; none was.` : ' Nothing was taken back.';
      throw new StudioError(errors.every((error) => error.code === 'not_found') ? 'bad_input' : 'conflict', errors[0].message + more, { field: `items.${errors[0].index}`, errors });
    }
    const taken = input.items.map((item) => found.get(item.value_id)!);
    await tx.execute(sql`
      insert into withdrawals (approval_id, reason, withdrawn_by)
      select unnest(${sql.param(taken.map((one) => one.id))}::uuid[]), ${input.reason}, ${acting.actor.userId}::uuid`);
    await refreshApprovalStates(tx, taken.filter((one) => one.shot_id === null).map((one) => one.part_id), revision + 1);
    await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
    const subject = taken.length === 1 ? `${taken[0].asset}/${taken[0].part}` : `${taken.length} approvals`;
    const items = taken.map((one) => ({ partId: one.part_id, shotId: one.shot_id, field: one.shot_id === null ? 'approval' : 'override_approval', before: one.id, after: null }));
    const eventId = await recordEvent(tx, acting, { showId: show.id, act: 'withdraw-approvals', subject, reason: input.reason, items });
    await tellOfWithdrawals(tx, acting, show, { eventId, reason: input.reason, valueIds: taken.map((one) => one.id) });
    return { items: taken.map((one) => ({ asset: one.asset, part: one.part, value_id: one.id })) };
  });
}

function checkItems(input: WithdrawApprovalsInput, found: ReadonlyMap<string, Standing>): ItemError[] {
  const errors: ItemError[] = [];
  const seen = new Set<string>();
  input.items.forEach(({ value_id: id }, index) => {
    const one = found.get(id);
    const add = (code: string, message: string): void => void errors.push({ index, asset: one?.asset, part: one?.part, code, message });
    if (!one) add('not_found', `There is no approved value ${id} in this show.`);
    else if (seen.has(id)) add('bad_input', `${one.asset}/${one.part} is named twice.`);
    else if (one.withdrawn) add('already_withdrawn', `The approval of ${one.asset}/${one.part} was taken back before.`);
    else if (one.locked_in.length > 0) add('locked', `${one.asset}/${one.part} is locked to this value in ${one.locked_in.join(', ')}. Unlock it there first.`);
    seen.add(id);
  });
  return errors;
}

async function findStanding(tx: Transaction, showId: string, ids: readonly string[]): Promise<Map<string, Standing>> {
  const { rows } = await tx.execute<Standing>(sql`
    select a.id, a.part_id, a.shot_id, a.asset, a.part, exists (select 1 from withdrawals w where w.approval_id = a.id) as withdrawn,
      array(select distinct s.code from locks l join shots s on s.id = l.shot_id where l.approval_id = a.id and l.unlocked_at is null order by s.code) as locked_in
    from approvals a where a.show_id = ${showId} and a.id = any(${sql.param(ids)}::uuid[])`);
  return new Map(rows.map((row) => [row.id, row]));
}
