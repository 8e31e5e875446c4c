import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import { approvalRequests } from '@/db/schema/approval-requests';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { tellOfApprovals } from '@/lib/notices/tell-of-approvals';
import type { ApproveValuesInput } from '@/lib/rules/inputs/approve-values';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { checkCandidates } from './check-candidates';
import { findCandidates, type Candidate } from './find-candidates';
import { approvalKey, insertApprovals } from './insert-approvals';
import { refreshApprovalStates } from './refresh-approval-states';

export interface ApproveAnswer {
  items: { asset: string; part: string; value_id: string }[];
}

/**
 * Approves exactly the values that were seen: all items or none. A value that is approved already keeps its approval.
 * Errors per item: not_found, no_value, changed_meanwhile (another value by now, with the row as it is), own_value (the approver
 * set it, and the show does not allow that), beyond_tolerance (to carry over, but it moved too far).
 */
export async function approveValues(context: Context, input: ApproveValuesInput): Promise<ApproveAnswer> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'approveValues');
  return acting.db.transaction(async (tx) => {
    const { revision } = await lockShowValues(tx, show.id);
    const found = await findCandidates(tx, show.id, input.items);
    const errors = await checkCandidates(tx, { show, actor: acting.actor, items: input.items, found, carryOver: input.carry_over });
    if (errors.length > 0) {
      const stale = errors.every((error) => error.code === 'changed_meanwhile');
      const more = errors.length > 1 ? ` ${errors.length} items cannot be approved; nothing was.` : ' Nothing was approved.';
      throw new StudioError(stale ? 'conflict' : 'bad_input', errors[0].message + more, { field: `items.${errors[0].index}`, errors });
    }
    const candidates = found.filter((one): one is Candidate => one !== null);
    const fresh = candidates.filter((one) => one.valueId === null);
    const ids = fresh.length === 0 ? new Map<string, string>() : await insertApprovals(tx, fresh, { approvedBy: acting.actor.userId, note: input.note || null, carriedOver: input.carry_over });
    if (fresh.length > 0) {
      const own = fresh.filter((one) => one.shotId === null).map((one) => one.partId);
      await refreshApprovalStates(tx, own, revision + 1);
      await tx.update(shows).set({ revision: revision + 1 }).where(eq(shows.id, show.id));
      const asked = await tx.update(approvalRequests).set({ closedAt: sql`now()` }).where(and(inArray(approvalRequests.partId, own), isNull(approvalRequests.closedAt))).returning({ partId: approvalRequests.partId, askedBy: approvalRequests.askedBy });
      const subject = fresh.length === 1 ? `${fresh[0].asset}/${fresh[0].part}` : `${fresh.length} values`;
      const items = fresh.map((one) => ({ partId: one.partId, shotId: one.shotId, field: one.shotId === null ? 'approval' : 'override_approval', before: one.lastApprovalId, after: ids.get(approvalKey(one.partId, one.shotId)) ?? null }));
      const eventId = await recordEvent(tx, acting, { showId: show.id, act: input.carry_over ? 'carry-over' : 'approve-values', subject, reason: input.note || null, items });
      await tellOfApprovals(tx, acting, show, { eventId, note: input.note || null, valueIds: [...ids.values()], asked });
    }
    return { items: candidates.map((one) => ({ asset: one.asset, part: one.part, value_id: one.valueId ?? ids.get(approvalKey(one.partId, one.shotId)) ?? '' })) };
  });
}
