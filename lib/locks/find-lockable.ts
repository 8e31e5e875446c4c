import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { valueColumnList } from '@/lib/values/value-column-list';

/** Something that is to be locked: an approval in a shot and copy. */
export interface LockWish {
  shotId: string;
  copy: string;
  approvalId: string;
}

/** A wish with all that the lock will hold and all that may stand against it. */
export interface Lockable extends Record<string, unknown> {
  shot_id: string;
  shot: string;
  sequence: string;
  copy: string;
  approval_id: string;
  part_id: string;
  asset_id: string;
  asset: string;
  part: string;
  /** The part's name today, after a rename. */
  part_now: string;
  row: string;
  value_sha256: string;
  /** Of an override's approval: the shot it belongs to. */
  only_shot_id: string | null;
  withdrawn: boolean;
  /** The asset is in the shot with this copy. */
  in_shot: boolean;
  /** The live lock of the part in this shot and copy. */
  lock_id: string | null;
  locked_approval_id: string | null;
  /** Reason of the override. */
  reason: string | null;
}

/** The wishes that name an approval and a shot of the show, in their order; others are null. One query. */
export async function findLockable(db: Executor, showId: string, wishes: readonly LockWish[]): Promise<(Lockable | null)[]> {
  const given = wishes.map((wish, ordinal) => ({ ordinal, shot_id: wish.shotId, copy: wish.copy, approval_id: wish.approvalId }));
  const { rows } = await db.execute<Lockable & { ordinal: number }>(sql`
    select given.ordinal, given.copy, s.id as shot_id, s.code as shot, s.sequence, a.id as approval_id, a.part_id, a.asset_id, q.name as part_now, a.shot_id as only_shot_id, ${valueColumnList('a')},
      exists (select 1 from withdrawals w where w.approval_id = a.id) as withdrawn,
      exists (select 1 from shot_assets i where i.shot_id = s.id and i.asset_id = a.asset_id and i.copy = given.copy) as in_shot,
      l.id as lock_id, l.approval_id as locked_approval_id,
      (select o.reason from shot_overrides o where o.shot_id = a.shot_id and o.part_id = a.part_id and o.value_sha256 = a.value_sha256 order by o.drafted_at desc limit 1) as reason
    from json_to_recordset(${JSON.stringify(given)}::json) as given(ordinal integer, shot_id uuid, copy text, approval_id uuid)
    join shots s on s.id = given.shot_id and s.show_id = ${showId}
    join approvals a on a.id = given.approval_id and a.show_id = ${showId}
    join parts q on q.id = a.part_id
    left join lock_claims c on c.shot_id = s.id and c.copy = given.copy and c.part_id = a.part_id and c.released_at is null
    left join locks l on l.id = c.lock_id`);
  const found: (Lockable | null)[] = wishes.map(() => null);
  for (const { ordinal, ...row } of rows) found[ordinal] = row as Lockable;
  return found;
}
