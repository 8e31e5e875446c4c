import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import type { NoticeText } from '@/db/schema/notices';
import type { ActorContext } from '@/lib/context';
import type { LiveLock } from '@/lib/locks/end-locks';
import type { Show } from '@/lib/shows/get-show-access';
import { counted, cutList, shortList } from './list-words';
import { GUEST_LINK, shotsLink } from './notice-paths';
import { tellPeople } from './tell-people';
import { valueFacts } from './value-facts';

/** A lock that ended, and the approved value that a new lock holds in its place; null where none does. */
export interface EndedLock {
  lock: LiveLock;
  becomes: string | null;
}

/**
 * Tells those who took the locked values, and those who asked to be told of the show, the shot or the asset, that locks ended, and
 * why. A guest is told of what they are invited to. One message a person and act.
 * @param eventId the act in the history
 */
export async function tellOfUnlock(tx: Transaction, acting: ActorContext, show: Show, { eventId, reason, ended }: { eventId: number; reason: string; ended: readonly EndedLock[] }): Promise<void> {
  const concerned = await findConcerned(tx, show, ended.map(({ lock }) => lock.id));
  if (concerned.length === 0) return;
  const facts = await valueFacts(tx, ended.flatMap(({ lock, becomes }) => [lock.approval_id, ...(becomes === null ? [] : [becomes])]));
  const byId = new Map(ended.map((one) => [one.lock.id, one]));
  const tellings = concerned.map(({ user_id: userId, lock_ids: ids, took, guest }) => {
    const theirs = ids.map((id) => byId.get(id)!);
    return { userIds: [userId], text: textOf(acting.actor.name, show, reason, theirs, facts, { took, guest }) };
  });
  await tellPeople(tx, { showId: show.id, actorId: acting.actor.userId, key: `unlock:${eventId}`, tellings });
}

interface Concerned extends Record<string, unknown> {
  user_id: string;
  lock_ids: string[];
  took: boolean;
  guest: boolean;
}

async function findConcerned(tx: Transaction, show: Show, lockIds: readonly string[]): Promise<Concerned[]> {
  const { rows } = await tx.execute<Concerned>(sql`
    with concerned as (
      select r.user_id, h.lock_id, true as took from receipt_rows h join receipts r on r.id = h.receipt_id where h.lock_id = any(${sql.param(lockIds)}::uuid[])
      union all
      select t.user_id, l.id, false from locks l
      join people_told t on t.show_id = l.show_id and (t.shot_id = l.shot_id or t.asset_id = l.asset_id or (t.shot_id is null and t.asset_id is null))
      where l.id = any(${sql.param(lockIds)}::uuid[])
    )
    select c.user_id, array_agg(distinct c.lock_id) as lock_ids, bool_or(c.took) as took, not u.is_admin and m.role = 'guest' as guest
    from concerned c
    join users u on u.id = c.user_id
    join locks l on l.id = c.lock_id join shots s on s.id = l.shot_id join assets a on a.id = l.asset_id
    left join members m on m.user_id = c.user_id and m.show_id = ${show.id}
    where u.is_admin or m.role <> 'guest' or a.code = any(m.assets) or lower(s.code) in (select lower(code) from unnest(m.shots) as invited(code))
    group by c.user_id, u.is_admin, m.role`);
  return rows;
}

function textOf(by: string, show: Show, reason: string, ended: readonly EndedLock[], facts: ReadonlyMap<string, string>, reader: { took: boolean; guest: boolean }): NoticeText {
  const nameOf = ({ lock }: EndedLock): string => `${lock.asset}/${lock.part}${lock.copy ? ` (copy ${lock.copy})` : ''}`;
  const sorted = [...ended].sort((a, b) => (`${a.lock.shot} ${nameOf(a)}` < `${b.lock.shot} ${nameOf(b)}` ? -1 : 1));
  const shots = sorted.map(({ lock }) => lock.shot);
  const what = sorted.length === 1 ? nameOf(sorted[0]) : counted(sorted.length, 'value');
  const act = sorted.every(({ becomes }) => becomes !== null) ? 're-locked' : 'unlocked';
  const where = `in ${shortList(shots)}`;
  const lineOf = (one: EndedLock): string => {
    const before = facts.get(one.lock.approval_id) ?? '';
    const after = one.becomes === null ? null : (facts.get(one.becomes) ?? '');
    return `${one.lock.shot}: ${nameOf(one)} ${after === null ? `was locked to ${before}` : `was ${before}, is ${after} now`}`;
  };
  return {
    subject: `${what} ${act} ${where} (${show.title})`,
    lines: [`${by} ${act} ${what} ${where} of ${show.title}.`, `Reason: ${reason}`],
    list: cutList(sorted.map(lineOf)),
    ...(reader.guest ? GUEST_LINK : shotsLink(show.code, shots)),
    why: reader.took ? 'You are told because you took these values.' : 'You are told because you asked to be.',
  };
}
