import { sql } from 'drizzle-orm';

/**
 * Joins for a live lock (alias l): the override that stands in its shot (o), and the part as it is now (c). A lock is measured
 * against the override where one stands, since new versions of the asset do not touch that.
 */
export const NOW_OF_LOCK = sql`
  left join shot_overrides o on o.shot_id = l.shot_id and o.part_id = l.part_id and o.dropped_at is null
  left join part_current c on c.part_id = l.part_id`;

/** Whether the lock's part has another value by now, or none. */
export const LOCK_IS_OUTDATED = sql`((case when o.id is null then c.value_sha256 else o.value_sha256 end) is distinct from l.value_sha256)`;

/** The newest standing approval (n) of the very value that an override (o) holds, as a lateral join. */
export const APPROVAL_OF_OVERRIDE = sql`
  left join lateral (select n.id from approvals n where n.shot_id = o.shot_id and n.part_id = o.part_id and n.value_sha256 = o.value_sha256
    and not exists (select 1 from withdrawals w where w.approval_id = n.id) order by n.ordinal desc limit 1) n on o.id is not null`;
