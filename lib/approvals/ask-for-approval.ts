import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import { tellOfQuestion } from '@/lib/notices/tell-of-approvals';
import type { AskForApprovalInput } from '@/lib/rules/inputs/ask-for-approval';
import { STATE_WORDS } from '@/lib/rules/states';
import { StudioError, type ItemError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { findCandidates, type Candidate } from './find-candidates';

/**
 * Asks the leads to approve values, or takes one's own questions back: all items or none. Asking again for the same part renews the
 * question. Errors per item: not_found, no_value, changed_meanwhile, already_approved.
 */
export async function askForApproval(context: Context, input: AskForApprovalInput): Promise<{ asked: number }> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'askApproval');
  return acting.db.transaction(async (tx) => {
    await lockShowValues(tx, show.id);
    const found = await findCandidates(tx, show.id, input.items);
    const errors = found.flatMap((one, index) => errorOf(input, one, index) ?? []);
    if (errors.length > 0) throw new StudioError('bad_input', `${errors[0].message} Nothing was asked.`, { field: `items.${errors[0].index}`, errors });
    const parts = found.filter((one): one is Candidate => one !== null);
    const ids = sql.param([...new Set(parts.map((one) => one.partId))]);
    const onlyOwn = input.take_back ? sql`and asked_by = ${acting.actor.userId}::uuid` : sql``;
    const closed = await tx.execute(sql`update approval_requests set closed_at = now() where part_id = any(${ids}::uuid[]) and closed_at is null ${onlyOwn}`);
    if (!input.take_back) {
      await tx.execute(sql`
        insert into approval_requests (show_id, part_id, value_sha256, note, asked_by)
        select show_id, part_id, value_sha256, ${input.note || null}, ${acting.actor.userId}::uuid from part_current where part_id = any(${ids}::uuid[])`);
    }
    const concerned = input.take_back ? (closed.rowCount ?? 0) : parts.length;
    if (concerned === 0) return { asked: 0 };
    const subject = parts.length === 1 ? `${parts[0].asset}/${parts[0].part}` : `${concerned} values`;
    const items = parts.map((one) => ({ partId: one.partId, field: 'asked', before: null, after: input.take_back ? null : one.valueSha256 }));
    const eventId = await recordEvent(tx, acting, { showId: show.id, act: input.take_back ? 'take-question-back' : 'ask-for-approval', subject, reason: input.note || null, items });
    if (!input.take_back) await tellOfQuestion(tx, acting, show, { eventId, note: input.note || null, parts });
    return { asked: concerned };
  });
}

function errorOf(input: AskForApprovalInput, one: Candidate | null, index: number): ItemError | null {
  const item = input.items[index];
  const name = `${item.asset}/${item.part ?? item.body ?? ''}`;
  const error = (code: string, message: string): ItemError => ({ index, asset: item.asset, part: item.part ?? item.body, code, message });
  if (!one) return error('not_found', `${item.asset} has no part ${item.part ?? item.body ?? ''} in its current version.`);
  if (input.take_back) return null;
  if (one.valueSha256 === null) return error('no_value', `${name} has no value to approve: ${STATE_WORDS[one.state]}.`);
  if (one.valueSha256 !== item.value_sha256) return error('changed_meanwhile', `${name} is another value by now.`);
  if (one.valueId !== null) return error('already_approved', `${name} is approved.`);
  return null;
}
