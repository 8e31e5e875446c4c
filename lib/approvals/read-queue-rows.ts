import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { ValueFinding } from '@/db/schema/part-current';
import type { Actor } from '@/lib/context';
import type { QueueRow } from '@/lib/rules/approval-queue';
import type { RowFinding } from '@/lib/rules/part-row';
import type { SourceFields } from '@/lib/rules/source-words';
import type { Origin } from '@/lib/rules/states';
import { isWithinTolerance, verdictWords } from '@/lib/rules/verdict';
import type { Show } from '@/lib/shows/get-show-access';
import { compareNumbers, numbersOf } from './compare-with-approvals';
import { toDifferencesAnswer } from './to-differences-answer';
import type { ValueNumbers } from './to-compared-value';

/** A value by its part, and by its shot where it is an override. */
export interface QueueKey {
  partId: string;
  shotId: string | null;
}

interface FoundRow extends SourceFields, Record<string, unknown> {
  ordinal: number;
  part_id: string;
  asset: string;
  category: QueueRow['category'];
  version: string;
  row: QueueRow['row'];
  part: string;
  shot: string | null;
  reason: string | null;
  value_sha256: string;
  numbers: ValueNumbers;
  value_findings: ValueFinding[];
  set_by: string | null;
  set_from: Origin | null;
  set_at: string | null;
  value_id: string | null;
  last: { value_id: string; version: string; approved_by: string; approved_at: string; note: string | null; numbers: ValueNumbers } | null;
  setters: Record<string, string>;
  request: { asked_by: string; asked_by_id: string; asked_at: string; note: string | null; value_sha256: string } | null;
  locked_shots: string[];
  findings: RowFinding[];
}

const SOURCE = ['mass_source', 'construction', 'material', 'target_mass_kg', 'density_kg_m3', 'areal_density_kg_m2'] as const;
const sourceOf = (table: string) => sql.raw(SOURCE.map((name) => `${table}.${name}`).join(', '));

const iso = (column: string) => sql.raw(`to_char(${column} at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`);

/** The named values as the queue shows them to the actor, in the order of the keys; one without a value is left out. One query. */
export async function readQueueRows(db: Executor, show: Show, actor: Actor, keys: readonly QueueKey[]): Promise<QueueRow[]> {
  if (keys.length === 0) return [];
  const given = keys.map((key, ordinal) => ({ ordinal, part_id: key.partId, shot_id: key.shotId }));
  const { rows } = await db.execute<FoundRow>(sql`
    with given as (select * from json_to_recordset(${JSON.stringify(given)}::json) as given(ordinal integer, part_id uuid, shot_id uuid)
    ), v as (
      select g.ordinal, g.part_id, g.shot_id, null::text as shot, null::text as reason, c.version_id, c.asset, c.category, c.version, c."row", c.part, c.value_sha256,
        ${numbersOf('c')} as numbers, ${sourceOf('c')}, c.value_findings, c.set_by, c.set_from, c.set_at
      from given g join part_current c on c.part_id = g.part_id and c.value_sha256 is not null where g.shot_id is null
      union all
      select g.ordinal, g.part_id, g.shot_id, s.code, o.reason, o.version_id, o.asset, o.category, o.version, o."row", o.part, o.value_sha256,
        ${numbersOf('o')}, ${sourceOf('o')}, o.value_findings, u.name, null, o.drafted_at
      from given g
      join shot_overrides o on o.part_id = g.part_id and o.shot_id = g.shot_id and o.dropped_at is null and o.value_sha256 is not null
      join shots s on s.id = o.shot_id
      join users u on u.id = o.drafted_by
    )
    select v.ordinal, v.part_id, v.asset, v.category, v.version, v."row", v.part, v.shot, v.reason, v.value_sha256, v.numbers, ${sourceOf('v')}, v.value_findings, v.set_by, v.set_from, ${iso('v.set_at')} as set_at,
      exact.id as value_id, last.shown as last,
      coalesce((select json_object_agg(u.id, u.name) from value_setters t join users u on u.id = t.user_id
        where t.part_id = v.part_id and t.shot_id is not distinct from v.shot_id and t.id > coalesce(last.setter_mark, 0)), '{}') as setters,
      (select json_build_object('asked_by', u.name, 'asked_by_id', u.id, 'asked_at', ${iso('r.asked_at')}, 'note', r.note, 'value_sha256', r.value_sha256)
        from approval_requests r join users u on u.id = r.asked_by where v.shot_id is null and r.part_id = v.part_id and r.closed_at is null) as request,
      array(select distinct s.code from locks l join shots s on s.id = l.shot_id
        where l.part_id = v.part_id and l.unlocked_at is null and (v.shot_id is null or l.shot_id = v.shot_id) order by s.code) as locked_shots,
      coalesce((select json_agg(json_build_object('code', f.code, 'severity', f.severity, 'message', f.message, 'count', f.count) order by f.ordinal)
        from asset_versions e join findings f on f.record_id = e.record_id and (f.part = v.part or f.part is null) and f.severity = 'warning' where e.id = v.version_id), '[]') as findings
    from v
    left join lateral (select a.setter_mark, json_build_object('value_id', a.id, 'version', a.version, 'approved_by', u.name, 'approved_at', ${iso('a.approved_at')}, 'note', a.note, 'numbers', ${numbersOf('a')}) as shown
      from approvals a join users u on u.id = a.approved_by where a.part_id = v.part_id and a.shot_id is not distinct from v.shot_id
      and not exists (select 1 from withdrawals w where w.approval_id = a.id) order by a.ordinal desc limit 1) last on true
    left join lateral (select a.id from approvals a where a.part_id = v.part_id and a.shot_id is not distinct from v.shot_id and a.value_sha256 = v.value_sha256
      and not exists (select 1 from withdrawals w where w.approval_id = a.id) order by a.ordinal desc limit 1) exact on true
    order by v.ordinal`);
  return rows.map((row) => toQueueRow(show, actor, row));
}

function toQueueRow(show: Show, actor: Actor, row: FoundRow): QueueRow {
  const { numbers, last, request } = row;
  const differences = row.value_id !== null || last === null ? null : compareNumbers(last.numbers, numbers);
  return {
    part_id: row.part_id,
    asset: row.asset,
    category: row.category,
    version: row.version,
    row: row.row,
    part: row.part,
    shot: row.shot,
    reason: row.reason,
    state: row.value_id !== null ? 'approved' : last === null ? 'measured' : 'outdated',
    value_sha256: row.value_sha256,
    value_id: row.value_id,
    mass_kg: numbers.mass_kg,
    com_x_m: numbers.com_x_m,
    com_y_m: numbers.com_y_m,
    com_z_m: numbers.com_z_m,
    ixx_kg_m2: numbers.ixx_kg_m2,
    iyy_kg_m2: numbers.iyy_kg_m2,
    izz_kg_m2: numbers.izz_kg_m2,
    bounds_m: boxOf(numbers.bounds_m),
    mass_source: row.mass_source,
    construction: row.construction,
    material: row.material,
    target_mass_kg: row.target_mass_kg,
    density_kg_m3: row.density_kg_m3,
    areal_density_kg_m2: row.areal_density_kg_m2,
    set_by: row.set_by,
    set_from: row.set_from,
    set_at: row.set_at,
    setters: Object.values(row.setters).sort(),
    own: row.value_id === null && row.setters[actor.userId] !== undefined && !show.selfApproval,
    request: request && { asked_by: request.asked_by, asked_at: request.asked_at, note: request.note, own: request.asked_by_id === actor.userId, changed: request.value_sha256 !== row.value_sha256 },
    last: last && {
      value_id: last.value_id,
      version: last.version,
      approved_by: last.approved_by,
      approved_at: last.approved_at,
      note: last.note,
      mass_kg: last.numbers.mass_kg,
      com_m: [last.numbers.com_x_m, last.numbers.com_y_m, last.numbers.com_z_m],
    },
    verdict: row.value_id !== null ? 'as approved' : differences === null ? 'first approval' : verdictWords(differences, show.linearUnit),
    beyond_tolerance: differences === null ? null : !isWithinTolerance(differences, show),
    differences: differences && toDifferencesAnswer(differences),
    locked_shots: row.locked_shots,
    warnings: [...row.value_findings.filter((one) => one.severity === 'warning').map((one) => ({ ...one, count: 1 })), ...row.findings],
  };
}

function boxOf(bounds: number[] | null): QueueRow['bounds_m'] {
  return bounds?.length === 6 ? [bounds[0], bounds[1], bounds[2], bounds[3], bounds[4], bounds[5]] : null;
}
