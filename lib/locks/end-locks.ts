import { sql } from 'drizzle-orm';
import type { Executor, Transaction } from '@/db/client';
import type { ItemError } from '@/lib/rules/studio-error';

export interface LiveLock extends Record<string, unknown> {
  id: string;
  shot_id: string;
  shot: string;
  copy: string;
  part_id: string;
  asset_id: string;
  asset: string;
  part: string;
  approval_id: string;
  ended: boolean;
}

/** The show's locks by id, ended ones too. */
export async function findLocks(db: Executor, showId: string, ids: readonly string[]): Promise<Map<string, LiveLock>> {
  const { rows } = await db.execute<LiveLock>(sql`
    select l.id, l.shot_id, s.code as shot, l.copy, l.part_id, l.asset_id, a.asset, a.part, l.approval_id, l.unlocked_at is not null as ended
    from locks l join shots s on s.id = l.shot_id join approvals a on a.id = l.approval_id
    where l.show_id = ${showId} and l.id = any(${sql.param(ids)}::uuid[])`);
  return new Map(rows.map((row) => [row.id, row]));
}

/** Why locks cannot be ended; with a shot, only its own count. */
export function checkLocks(ids: readonly string[], found: ReadonlyMap<string, LiveLock>, shotId: string | null): ItemError[] {
  const errors: ItemError[] = [];
  ids.forEach((id, index) => {
    const lock = found.get(id);
    const add = (code: string, message: string): void => void errors.push({ index, asset: lock?.asset, part: lock?.part, code, message });
    if (!lock || (shotId !== null && lock.shot_id !== shotId)) add('not_found', `There is no lock ${id} here.`);
    else if (ids.indexOf(id) !== index) add('bad_input', `The lock of ${lock.asset}/${lock.part} is named twice.`);
    else if (lock.ended) add('already_unlocked', `${lock.asset}/${lock.part} is not locked in ${lock.shot} any more.`);
  });
  return errors;
}

/** Ends live locks and gives back what they claim. */
export async function endLocks(tx: Transaction, ids: readonly string[], by: string, reason: string): Promise<void> {
  const ended = await tx.execute(sql`
    update locks set unlocked_at = now(), unlocked_by = ${by}::uuid, unlock_reason = ${reason} where id = any(${sql.param(ids)}::uuid[]) and unlocked_at is null`);
  if (ended.rowCount !== ids.length) throw new Error(`${ended.rowCount} of ${ids.length} locks were ended.`);
  await tx.execute(sql`update lock_claims set released_at = now() where lock_id = any(${sql.param(ids)}::uuid[]) and released_at is null`);
}
