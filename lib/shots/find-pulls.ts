import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { compareNumbers, numbersOf } from '@/lib/approvals/compare-with-approvals';
import type { ValueNumbers } from '@/lib/approvals/to-compared-value';
import type { ChangeSince, ShotPull, SinceLastPull } from '@/lib/rules/shot-detail';
import { verdictWords } from '@/lib/rules/verdict';
import type { Show } from '@/lib/shows/get-show-access';

const MOST_PULLS = 50;

/** Who took the shot, newest first, and whether they hold what is locked now. */
export async function findPulls(db: Executor, shotId: string): Promise<ShotPull[]> {
  const { rows } = await db.execute<ShotPull & Record<string, unknown>>(sql`
    select r.id, u.name as taken_by, t.name as token, to_char(r.created_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as taken_at, r.format, r.rows, r.sha256,
      r.rows = (select count(*) from locks l where l.shot_id = r.shot_id and l.unlocked_at is null)
        and not exists (select 1 from receipt_rows h join locks l on l.id = h.lock_id where h.receipt_id = r.id and l.unlocked_at is not null) as current
    from receipts r join users u on u.id = r.user_id left join api_tokens t on t.id = r.token_id
    where r.shot_id = ${shotId}
    order by r.created_at desc, r.id desc limit ${MOST_PULLS}`);
  return rows;
}

interface FoundChange extends Record<string, unknown> {
  copy: string;
  asset: string;
  part: string;
  before: ValueNumbers | null;
  after: ValueNumbers | null;
  by: string;
  at: string;
  reason: string | null;
}

/** What became of the shot's locks since somebody's last download of it; null where they took nothing of it yet. */
export async function findChangesSince(db: Executor, show: Show, shotId: string, userId: string): Promise<SinceLastPull | null> {
  const {
    rows: [last],
  } = await db.execute<{ id: string; taken_at: string; sha256: string }>(sql`
    select id, to_char(created_at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as taken_at, sha256 from receipts
    where shot_id = ${shotId} and user_id = ${userId} order by created_at desc, id desc limit 1`);
  if (!last) return null;
  const { rows } = await db.execute<FoundChange>(sql`
    select coalesce(n.copy, w.copy) as copy, coalesce(na.asset, wa.asset) as asset, coalesce(na.part, wa.part) as part,
      case when w.id is not null then ${numbersOf('wa')} end as before, case when n.id is not null then ${numbersOf('na')} end as after,
      coalesce(nu.name, wu.name) as by, to_char(coalesce(n.locked_at, w.unlocked_at) at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at, w.unlock_reason as reason
    from (select l.* from receipt_rows h join locks l on l.id = h.lock_id where h.receipt_id = ${last.id}) w
    full join (select * from locks where shot_id = ${shotId} and unlocked_at is null) n on n.part_id = w.part_id and n.copy = w.copy
    left join approvals wa on wa.id = w.approval_id
    left join approvals na on na.id = n.approval_id
    left join users nu on nu.id = n.locked_by
    left join users wu on wu.id = w.unlocked_by
    where w.id is distinct from n.id
    order by 2, 1, 3`);
  return { taken_at: last.taken_at, sha256: last.sha256, changes: rows.map((row) => toChange(show, row)) };
}

function toChange(show: Show, { copy, asset, part, before, after, by, at, reason }: FoundChange): ChangeSince {
  const kind = before === null ? 'added' : after === null ? 'ended' : 'relocked';
  const verdict = before === null || after === null ? null : verdictWords(compareNumbers(before, after), show.linearUnit);
  return { asset, copy: copy || null, part, kind, verdict, before_kg: before?.mass_kg ?? null, after_kg: after?.mass_kg ?? null, by, at, reason };
}
