import { sql, type SQL } from 'drizzle-orm';
import { LOCK_IS_OUTDATED, NOW_OF_LOCK } from '@/lib/locks/lock-standing';

/**
 * A subquery of shot_id, asset_id, copies, locked, missing, outdated and overrides: one row for each asset in each of the chosen
 * shots. Parts are counted once an asset and locks once a shot, never every part of every shot, so that thousands of shots are one
 * pass over the locks. A part that is left out is in no shot.
 * @param chosen a query of shot ids
 */
export function assetStanding(showId: string, chosen: SQL): SQL {
  return sql`
    select i.shot_id, i.asset_id, i.copies, coalesce(l.locked, 0)::int as locked, coalesce(l.outdated, 0)::int as outdated,
      (i.copies * coalesce(p.parts, 0) - coalesce(k.covered, 0))::int as missing, coalesce(v.overrides, 0)::int as overrides
    from (select shot_id, asset_id, count(*)::int as copies from shot_assets where shot_id in (${chosen}) group by shot_id, asset_id) i
    left join (select asset_id, count(*) as parts from part_current where show_id = ${showId} and state <> 'left_out' group by asset_id) p on p.asset_id = i.asset_id
    left join (
      select k.shot_id, c.asset_id, count(*) as covered
      from lock_claims k join part_current c on c.part_id = k.part_id and c.state <> 'left_out'
      where k.released_at is null and k.shot_id in (${chosen}) group by k.shot_id, c.asset_id) k on k.shot_id = i.shot_id and k.asset_id = i.asset_id
    left join (
      select l.shot_id, l.asset_id, count(*) as locked, count(*) filter (where ${LOCK_IS_OUTDATED}) as outdated
      from locks l ${NOW_OF_LOCK}
      where l.unlocked_at is null and l.shot_id in (${chosen}) group by l.shot_id, l.asset_id) l on l.shot_id = i.shot_id and l.asset_id = i.asset_id
    left join (
      select o.shot_id, q.asset_id, count(*) as overrides
      from shot_overrides o join parts q on q.id = o.part_id
      where o.dropped_at is null and o.shot_id in (${chosen}) group by o.shot_id, q.asset_id) v on v.shot_id = i.shot_id and v.asset_id = i.asset_id`;
}

/** The same by shot: shot_id and the sums, and `assets` as JSON in the order of their codes. */
export function shotStanding(showId: string, chosen: SQL): SQL {
  return sql`
    select t.shot_id, sum(t.locked)::int as locked, sum(t.missing)::int as missing, sum(t.outdated)::int as outdated, sum(t.overrides)::int as overrides,
      json_agg(json_build_object('asset', a.code, 'copies', t.copies) order by a.code collate "C") as assets
    from (${assetStanding(showId, chosen)}) t join assets a on a.id = t.asset_id
    group by t.shot_id`;
}
