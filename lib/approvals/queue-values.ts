import { sql, type SQL } from 'drizzle-orm';
import type { QueueFilter } from '@/lib/rules/approval-queue';

/**
 * Every value of a show that is approved or could be, under the columns part_id, shot_id, shot ('' for a part's own), asset, part,
 * state (measured, outdated, approved) and asked. An override that is locked or waits is a value of its shot.
 */
export function queueValues(showId: string): SQL {
  return sql`
    select c.part_id, null::uuid as shot_id, '' as shot, c.asset, c.part, c.state, r.part_id is not null as asked
    from part_current c
    left join approval_requests r on r.part_id = c.part_id and r.closed_at is null
    where c.show_id = ${showId} and c.state in ('measured', 'outdated', 'approved')
    union all
    select o.part_id, o.shot_id, s.code, o.asset, o.part, case when y.same then 'approved' when y.other then 'outdated' else 'measured' end, false
    from shots s
    join shot_overrides o on o.shot_id = s.id and o.dropped_at is null and o.state = 'measured'
    cross join lateral (
      select coalesce(bool_or(a.value_sha256 = o.value_sha256), false) as same, count(*) > 0 as other
      from approvals a where a.part_id = o.part_id and a.shot_id = o.shot_id and not exists (select 1 from withdrawals w where w.approval_id = a.id)
    ) y
    where s.show_id = ${showId}`;
}

/** What each filter lets through, over the columns of queueValues. */
export const QUEUE_CONDITIONS: Record<QueueFilter, SQL> = {
  waiting: sql`state <> 'approved'`,
  asked: sql`state <> 'approved' and asked`,
  outdated: sql`state = 'outdated'`,
  approved: sql`state = 'approved'`,
};
