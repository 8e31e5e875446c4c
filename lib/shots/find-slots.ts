import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { findOutdated } from '@/lib/locks/list-outdated';
import { APPROVAL_OF_OVERRIDE } from '@/lib/locks/lock-standing';
import type { CurrentValue, ShotLock, ShotOverride, ShotSlot } from '@/lib/rules/shot-detail';
import type { RowKind } from '@/lib/rules/states';
import type { Show } from '@/lib/shows/get-show-access';

interface Found extends Record<string, unknown> {
  shot: string;
  sequence: string;
  copy: string;
  part_id: string;
  asset: string;
  part: string;
  row: RowKind;
  lock: ShotLock | null;
  override: ShotOverride | null;
  current: CurrentValue | null;
  ready_value_id: string | null;
}

const UTC = `'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"'`;
const iso = (column: string) => sql.raw(`to_char(${column} at time zone 'utc', ${UTC})`);

/**
 * Every part in a shot, or every place of one part in the show's shots, by sequence, shot, asset, copy and part: what is locked, what
 * it is now, and its override. What is left out and not locked is in no shot. Two queries.
 */
export async function findSlots(db: Executor, show: Show, of: { shotId: string } | { partId: string }): Promise<ShotSlot[]> {
  const [column, id] = 'shotId' in of ? ['shot_id', of.shotId] : ['part_id', of.partId];
  const scope = (alias: { shot_id: string; part_id: string }) => sql`${sql.raw(alias[column as 'shot_id' | 'part_id'])} = ${id}`;
  const { rows } = await db.execute<Found>(sql`
    with slot as (
      select i.shot_id, i.copy, p.part_id from shot_assets i join part_current p on p.asset_id = i.asset_id and p.state <> 'left_out'
      where p.show_id = ${show.id} and ${scope({ shot_id: 'i.shot_id', part_id: 'p.part_id' })}
      union
      select l.shot_id, l.copy, l.part_id from locks l where l.show_id = ${show.id} and l.unlocked_at is null and ${scope({ shot_id: 'l.shot_id', part_id: 'l.part_id' })}
    )
    select s.code as shot, s.sequence, t.copy, t.part_id, a.code as asset, q.name as part, coalesce(v."row", c."row", 'part') as "row",
      case when l.id is not null then json_build_object('id', l.id, 'value_id', v.id, 'version', v.version, 'mass_kg', v.mass_kg, 'locked_by', lu.name, 'locked_at', ${iso('l.locked_at')},
        'approved_by', vu.name, 'approved_at', ${iso('v.approved_at')}, 'of_override', v.shot_id is not null,
        'taken_by', coalesce((select json_agg(distinct u.name) from receipt_rows h join receipts r on r.id = h.receipt_id join users u on u.id = r.user_id where h.lock_id = l.id), '[]')) end as lock,
      case when o.id is not null then json_build_object('reason', o.reason, 'drafted_by', ou.name, 'drafted_at', ${iso('o.drafted_at')}, 'version', o.version, 'mass_kg', o.mass_kg,
        'state', case when n.id is null then o.state else 'approved' end, 'construction', o.construction, 'mass_source', o.mass_source, 'target_mass_kg', o.target_mass_kg,
        'density_kg_m3', o.density_kg_m3, 'material', o.material, 'areal_density_kg_m2', o.areal_density_kg_m2, 'wall_m', o.wall_m) end as override,
      case when c.part_id is not null then json_build_object('version', c.version, 'state', c.state, 'mass_kg', c.mass_kg) end as current,
      case when o.id is null then c.value_id else n.id end as ready_value_id
    from slot t
    join shots s on s.id = t.shot_id
    join parts q on q.id = t.part_id
    join assets a on a.id = q.asset_id
    left join part_current c on c.part_id = t.part_id
    left join lock_claims k on k.shot_id = t.shot_id and k.copy = t.copy and k.part_id = t.part_id and k.released_at is null
    left join locks l on l.id = k.lock_id
    left join approvals v on v.id = l.approval_id
    left join users lu on lu.id = l.locked_by
    left join users vu on vu.id = v.approved_by
    left join shot_overrides o on o.shot_id = t.shot_id and o.part_id = t.part_id and o.dropped_at is null
    left join users ou on ou.id = o.drafted_by
    ${APPROVAL_OF_OVERRIDE}
    order by s.sequence collate "C", s.code collate "C", a.code collate "C", t.copy collate "C", q.name collate "C"`);
  const outdated = new Map((await findOutdated(db, show, scope({ shot_id: 'l.shot_id', part_id: 'l.part_id' }))).map((one) => [one.lock, one]));
  return rows.map((row) => ({ ...row, copy: row.copy || null, outdated: (row.lock && outdated.get(row.lock.id)) ?? null }));
}
