import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import type { Moved } from './find-moved';

/** Somebody who is to be told of an import, why, and of which of its differences. */
export interface ImportReader {
  userId: string;
  why: string;
  concerns: (moved: Moved) => boolean;
}

interface Found extends Record<string, unknown> {
  user_id: string;
  show: boolean;
  assets: string[];
  shots: string[];
  locks: string[];
}

/** Who asked to be told of the show, an asset or a shot concerned, who took a lock concerned, and who locked it. No guests: they see what is locked alone. */
export async function findImportReaders(tx: Transaction, showId: string, moved: readonly Moved[]): Promise<ImportReader[]> {
  const locks = [...new Set(moved.flatMap((one) => one.locks.map((lock) => lock.id)))];
  const shots = [...new Set(moved.flatMap((one) => one.locks.map((lock) => lock.shotId)))];
  const assets = [...new Set(moved.map((one) => one.assetId))];
  const { rows } = await tx.execute<Found>(sql`
    with reader as (
      select t.user_id, t.shot_id is null and t.asset_id is null as show, t.asset_id, t.shot_id, null::uuid as lock_id from people_told t
      where t.show_id = ${showId} and ((t.shot_id is null and t.asset_id is null) or t.asset_id = any(${sql.param(assets)}::uuid[]) or t.shot_id = any(${sql.param(shots)}::uuid[]))
      union all
      select r.user_id, false, null, null, h.lock_id from receipt_rows h join receipts r on r.id = h.receipt_id where h.lock_id = any(${sql.param(locks)}::uuid[])
      union all
      select l.locked_by, false, null, null, l.id from locks l where l.id = any(${sql.param(locks)}::uuid[])
    )
    select r.user_id, bool_or(r.show) as show, array_remove(array_agg(distinct r.asset_id), null) as assets,
      array_remove(array_agg(distinct r.shot_id), null) as shots, array_remove(array_agg(distinct r.lock_id), null) as locks
    from reader r join users u on u.id = r.user_id left join members m on m.user_id = r.user_id and m.show_id = ${showId}
    where u.is_admin or m.role <> 'guest'
    group by r.user_id`);
  return rows.map((row) => {
    const [ofAssets, ofShots, ofLocks] = [new Set(row.assets), new Set(row.shots), new Set(row.locks)];
    return {
      userId: row.user_id,
      why: row.show || ofAssets.size + ofShots.size > 0 ? 'You are told because you asked to be.' : 'You are told because you took or locked these values.',
      concerns: (one) => row.show || ofAssets.has(one.assetId) || one.locks.some((lock) => ofShots.has(lock.shotId) || ofLocks.has(lock.id)),
    };
  });
}
