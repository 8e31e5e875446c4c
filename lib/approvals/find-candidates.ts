import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { ApproveItem } from '@/lib/rules/inputs/approve-values';
import type { VALUE_STATES } from '@/lib/rules/states';

/** The value that an item names, as it is now: the part's own, or its override in a shot. */
export interface Candidate extends Record<string, unknown> {
  partId: string;
  assetId: string;
  shotId: string | null;
  asset: string;
  part: string;
  state: (typeof VALUE_STATES)[number];
  valueSha256: string | null;
  /** The standing approval of this very value. */
  valueId: string | null;
  /** The newest standing approval of the part (in the shot), whatever its value. */
  lastApprovalId: string | null;
  /** Names of those who changed an input since then, by their ids. */
  setters: Record<string, string>;
}

/** Values named by items, aligned with them; null where the show has no such row. One query. */
export async function findCandidates(db: Executor, showId: string, items: readonly Pick<ApproveItem, 'asset' | 'part' | 'body' | 'shot'>[]): Promise<(Candidate | null)[]> {
  const { rows } = await db.execute<Candidate & { ordinal: string }>(sql`
    with given as (
      select * from unnest(${sql.param(items.map((item) => item.asset))}::text[], ${sql.param(items.map((item) => item.part ?? item.body ?? ''))}::text[],
        ${sql.param(items.map((item) => (item.body === undefined ? 'part' : 'body')))}::text[], ${sql.param(items.map((item) => item.shot ?? null))}::text[]) with ordinality as given(asset, part, kind, shot, ordinal)
    ), named as (
      select given.ordinal, c.part_id, c.asset_id, null::uuid as shot_id, c.asset, c.part, c.state, c.value_sha256
      from given join part_current c on c.show_id = ${showId} and c.asset = given.asset collate "C" and c.part = given.part collate "C" and c."row" = given.kind
      where given.shot is null
      union all
      select given.ordinal, p.id, p.asset_id, s.id, a.code, p.name, o.state, o.value_sha256
      from given
      join shots s on s.show_id = ${showId} and lower(s.code) = lower(given.shot)
      join assets a on a.show_id = ${showId} and a.code = given.asset collate "C"
      join shot_overrides o on o.shot_id = s.id and o.dropped_at is null and o."row" = given.kind
      join parts p on p.id = o.part_id and p.asset_id = a.id and given.part collate "C" in (p.name, o.part)
    )
    select n.ordinal, n.part_id as "partId", n.asset_id as "assetId", n.shot_id as "shotId", n.asset, n.part, n.state, n.value_sha256 as "valueSha256",
      exact.id as "valueId", last.id as "lastApprovalId",
      coalesce((select json_object_agg(u.id, u.name) from value_setters v join users u on u.id = v.user_id
        where v.part_id = n.part_id and v.shot_id is not distinct from n.shot_id and v.id > coalesce(last.setter_mark, 0)), '{}') as setters
    from named n
    left join lateral (select id, setter_mark from approvals a where a.part_id = n.part_id and a.shot_id is not distinct from n.shot_id
      and not exists (select 1 from withdrawals w where w.approval_id = a.id) order by a.ordinal desc limit 1) last on true
    left join lateral (select id from approvals a where a.part_id = n.part_id and a.shot_id is not distinct from n.shot_id and a.value_sha256 = n.value_sha256
      and not exists (select 1 from withdrawals w where w.approval_id = a.id) order by a.ordinal desc limit 1) exact on true`);
  const found: (Candidate | null)[] = items.map(() => null);
  for (const { ordinal, ...row } of rows) found[Number(ordinal) - 1] = row as Candidate;
  return found;
}
