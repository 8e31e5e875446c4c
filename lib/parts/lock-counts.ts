import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { LOCK_IS_OUTDATED, NOW_OF_LOCK } from '@/lib/locks/lock-standing';

export interface LockCounts {
  /** Shots that have the part locked. */
  locked_in: number;
  /** Of these, shots where the part has another value by now, or none. */
  outdated_in: number;
}

export const NO_LOCKS: LockCounts = { locked_in: 0, outdated_in: 0 };

/** In how many shots parts are locked and out of date, by part; parts without a lock are absent. One query. */
export async function lockCounts(db: Executor, partIds: readonly string[]): Promise<Map<string, LockCounts>> {
  if (partIds.length === 0) return new Map();
  const { rows } = await db.execute<LockCounts & Record<string, unknown> & { part_id: string }>(sql`
    select l.part_id, count(distinct l.shot_id)::int as locked_in, count(distinct l.shot_id) filter (where ${LOCK_IS_OUTDATED})::int as outdated_in
    from locks l ${NOW_OF_LOCK}
    where l.part_id = any(${sql.param(partIds)}::uuid[]) and l.unlocked_at is null
    group by l.part_id`);
  return new Map(rows.map(({ part_id: partId, ...counts }) => [partId, counts]));
}
