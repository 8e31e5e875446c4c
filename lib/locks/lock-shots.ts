import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { LockShotsInput } from '@/lib/rules/inputs/lock-values';
import type { LockShotsAnswer } from '@/lib/rules/lock-answers';
import type { ValueState } from '@/lib/rules/states';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { lockShowValues } from '@/lib/values/lock-show-values';
import { findLockable, type Lockable } from './find-lockable';
import { applyLocks } from './lock-values';

/**
 * Locks whatever is approved in whole shots, a sequence, or one asset wherever it is, and not locked yet; an approved override comes
 * before the part's own value. What has no approved value stays open and is listed. A repeated call locks nothing twice.
 */
export async function lockShots(context: Context, input: LockShotsInput): Promise<LockShotsAnswer> {
  const acting = requireActor(context);
  const { show } = await getShowAccess(acting.db, acting.actor, input.show, 'lockValues');
  return acting.db.transaction(async (tx) => {
    const at = await lockShowValues(tx, show.id);
    await refuseUnknown(tx, show.id, input);
    const open = await findOpen(tx, show.id, input);
    const ready = open.flatMap((one) => (one.approval_id === null ? [] : [{ shotId: one.shot_id, copy: one.copy, approvalId: one.approval_id }]));
    const lockables = (await findLockable(tx, show.id, ready)) as Lockable[];
    await applyLocks(tx, acting, show, at, lockables);
    const missing = open.filter((one) => one.approval_id === null).map(({ shot, asset, part, copy, state, override }) => ({ shot, asset, part, copy, state, override }));
    return { locked: lockables.length, missing };
  });
}

async function refuseUnknown(db: Executor, showId: string, { shots, sequence, asset }: LockShotsInput): Promise<void> {
  const { rows } = await db.execute<{ code: string }>(sql`
    select code from unnest(${sql.param(shots)}::text[]) as given(code) where not exists (select 1 from shots s where s.show_id = ${showId} and lower(s.code) = lower(given.code))
    union all select ${sequence ?? null} where ${sequence ?? null}::text is not null and not exists (select 1 from shots s where s.show_id = ${showId} and s.sequence = ${sequence ?? null})
    union all select ${asset ?? null} where ${asset ?? null}::text is not null and not exists (select 1 from assets a where a.show_id = ${showId} and a.code = ${asset ?? null})`);
  if (rows.length > 0) throw new StudioError('not_found', `The show has no ${rows.map((row) => row.code).join(', ')}.`);
}

interface OpenPart extends Record<string, unknown> {
  shot_id: string;
  shot: string;
  copy: string;
  asset: string;
  part: string;
  state: ValueState;
  override: boolean;
  approval_id: string | null;
}

/** Parts in the shots that no live lock covers, with what they could be locked to. What is left out is in no shot. */
async function findOpen(db: Executor, showId: string, { shots, sequence, asset }: LockShotsInput): Promise<OpenPart[]> {
  const ofShots = shots.length > 0 ? sql`and lower(s.code) = any(${sql.param(shots.map((code) => code.toLowerCase()))}::text[])` : sql``;
  const ofSequence = sequence === undefined ? sql`` : sql`and s.sequence = ${sequence}`;
  const ofAsset = asset === undefined ? sql`` : sql`and p.asset = ${asset}`;
  const { rows } = await db.execute<OpenPart>(sql`
    select s.id as shot_id, s.code as shot, i.copy, p.asset, p.part, coalesce(o.state, p.state) as state, o.id is not null as override,
      case when o.id is null then p.value_id else
        (select a.id from approvals a where a.shot_id = s.id and a.part_id = p.part_id and a.value_sha256 = o.value_sha256
          and not exists (select 1 from withdrawals w where w.approval_id = a.id) order by a.ordinal desc limit 1) end as approval_id
    from shots s
    join shot_assets i on i.shot_id = s.id
    join part_current p on p.asset_id = i.asset_id and p.state <> 'left_out'
    left join shot_overrides o on o.shot_id = s.id and o.part_id = p.part_id and o.dropped_at is null
    where s.show_id = ${showId} ${ofShots} ${ofSequence} ${ofAsset}
      and not exists (select 1 from lock_claims c where c.shot_id = s.id and c.copy = i.copy and c.part_id = p.part_id and c.released_at is null)
    order by s.code collate "C", p.asset collate "C", p.part collate "C", i.copy`);
  return rows;
}
