import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';

/** Standing approvals of the part's own value, each looked up by the part: a list of all of them would be walked once a row. */
const standing = sql`select a.id from approvals a where a.part_id = c.part_id and a.shot_id is null and not exists (select 1 from withdrawals w where w.approval_id = a.id)`;

/**
 * Brings state and value_id of the parts' rows in line with their standing approvals, where they differ: the same rule as
 * approvalOf, for rows whose numbers stay. The caller holds the show's values.
 * @param revision the show's revision after the change
 */
export async function refreshApprovalStates(tx: Transaction, partIds: readonly string[], revision: number): Promise<number> {
  const result = await tx.execute(sql`
    with found as (
      select c.part_id, last.id as last_id, exact.id as exact_id,
        case when c.value_sha256 is null then c.state when exact.id is not null then 'approved' when last.id is not null then 'outdated' else 'measured' end as state
      from part_current c
      left join lateral (${standing} order by a.ordinal desc limit 1) last on true
      left join lateral (${standing} and a.value_sha256 = c.value_sha256 order by a.ordinal desc limit 1) exact on true
      where c.part_id = any(${sql.param(partIds)}::uuid[])
    )
    update part_current c set state = found.state, value_id = found.exact_id, last_approval_id = found.last_id,
      revision = c.revision + 1, changed_revision = ${revision}::bigint, updated_at = now()
    from found
    where c.part_id = found.part_id and (c.state, c.value_id, c.last_approval_id) is distinct from (found.state, found.exact_id, found.last_id)`);
  return result.rowCount ?? 0;
}
