import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import type { NoticeText } from '@/db/schema/notices';
import type { ActorContext } from '@/lib/context';
import type { Show } from '@/lib/shows/get-show-access';
import { counted, cutList } from './list-words';
import { approvalsLink, partsLink } from './notice-paths';
import { tellPeople } from './tell-people';
import { valueFacts } from './value-facts';

interface Found extends Record<string, unknown> {
  user_id: string;
  value_id: string;
  asset: string;
  part: string;
  shot: string | null;
}

/**
 * Tells those who asked for these approvals, or drafted the overrides, that they were given.
 * @param asked who asked, by part, of the questions that this act closed
 */
export async function tellOfApprovals(tx: Transaction, acting: ActorContext, show: Show, { eventId, note, valueIds, asked }: { eventId: number; note: string | null; valueIds: readonly string[]; asked: readonly { partId: string; askedBy: string }[] }): Promise<void> {
  const { rows } = await tx.execute<Found>(sql`
    select given.asked_by as user_id, a.id as value_id, a.asset, a.part, null::text as shot
    from unnest(${sql.param(asked.map((one) => one.partId))}::uuid[], ${sql.param(asked.map((one) => one.askedBy))}::uuid[]) as given(part_id, asked_by)
    join approvals a on a.part_id = given.part_id and a.shot_id is null and a.id = any(${sql.param(valueIds)}::uuid[])
    union all
    select o.drafted_by, a.id, a.asset, a.part, s.code
    from approvals a join shots s on s.id = a.shot_id
    join shot_overrides o on o.shot_id = a.shot_id and o.part_id = a.part_id and o.dropped_at is null
    where a.id = any(${sql.param(valueIds)}::uuid[])`);
  await tellEach(tx, acting, show, `approve:${eventId}`, rows, (what, list, found) => ({
    subject: `${what} approved (${show.title})`,
    lines: [`${acting.actor.name} approved ${what} of ${show.title}.`, ...(note ? [`Note: ${note}`] : [])],
    list,
    ...partsLink(show.code, found),
    why: found.some((one) => one.shot !== null) ? 'You are told because you asked for it or drafted it.' : 'You are told because you asked for it.',
  }));
}

/** Tells those who set or asked for what was approved that the approval was taken back, and why. */
export async function tellOfWithdrawals(tx: Transaction, acting: ActorContext, show: Show, { eventId, reason, valueIds }: { eventId: number; reason: string; valueIds: readonly string[] }): Promise<void> {
  const { rows } = await tx.execute<Found>(sql`
    select distinct who.user_id, a.id as value_id, a.asset, a.part, s.code as shot
    from approvals a
    left join shots s on s.id = a.shot_id
    cross join lateral (
      select v.user_id from value_setters v
      where v.part_id = a.part_id and v.shot_id is not distinct from a.shot_id and v.id <= a.setter_mark
        and v.id > coalesce((select max(b.setter_mark) from approvals b where b.part_id = a.part_id and b.shot_id is not distinct from a.shot_id and b.ordinal < a.ordinal), 0)
      union
      select q.asked_by from approval_requests q where a.shot_id is null and q.part_id = a.part_id and q.value_sha256 = a.value_sha256
    ) who
    where a.id = any(${sql.param(valueIds)}::uuid[])`);
  await tellEach(tx, acting, show, `withdraw:${eventId}`, rows, (what, list, found) => ({
    subject: `Approval of ${what} taken back (${show.title})`,
    lines: [`${acting.actor.name} took back the approval of ${what} of ${show.title}.`, `Reason: ${reason}`],
    list,
    ...partsLink(show.code, found),
    why: 'You are told because you set it or asked for it.',
  }));
}

/** Tells the show's leads that somebody asks for approval: one message an act. */
export async function tellOfQuestion(tx: Transaction, acting: ActorContext, show: Show, { eventId, note, parts }: { eventId: number; note: string | null; parts: readonly { asset: string; part: string }[] }): Promise<void> {
  const { rows } = await tx.execute<{ user_id: string }>(sql`select user_id from members where show_id = ${show.id} and role = 'lead'`);
  const names = parts.map((one) => `${one.asset}/${one.part}`).sort();
  const what = names.length === 1 ? names[0] : counted(names.length, 'value');
  const text: NoticeText = {
    subject: `${acting.actor.name} asks for approval of ${what} (${show.title})`,
    lines: [`${acting.actor.name} asks for approval of ${what} of ${show.title}.`, ...(note ? [`Note: ${note}`] : [])],
    list: names.length === 1 ? [] : cutList(names),
    ...approvalsLink(show.code),
    why: 'You are told because you lead the show.',
  };
  await tellPeople(tx, { showId: show.id, actorId: acting.actor.userId, key: `ask:${eventId}`, tellings: [{ userIds: rows.map((row) => row.user_id), text }] });
}

/** One telling a person, of the values that concern them. */
async function tellEach(tx: Transaction, acting: ActorContext, show: Show, key: string, found: readonly Found[], textOf: (what: string, list: string[], found: readonly Found[]) => NoticeText): Promise<void> {
  const byPerson = new Map<string, Found[]>();
  for (const one of found) byPerson.set(one.user_id, [...(byPerson.get(one.user_id) ?? []), one]);
  const facts = await valueFacts(tx, found.map((one) => one.value_id));
  const tellings = [...byPerson].map(([userId, theirs]) => {
    const unique = [...new Map(theirs.map((one) => [one.value_id, one])).values()];
    const nameOf = (one: Found): string => `${one.asset}/${one.part}${one.shot === null ? '' : ` in ${one.shot}`}`;
    const list = cutList(unique.map((one) => `${nameOf(one)}: ${facts.get(one.value_id) ?? ''}`).sort());
    return { userIds: [userId], text: textOf(unique.length === 1 ? nameOf(unique[0]) : counted(unique.length, 'value'), list, unique) };
  });
  await tellPeople(tx, { showId: show.id, actorId: acting.actor.userId, key, tellings });
}
