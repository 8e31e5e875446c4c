import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { compareNumbers, numbersOf } from '@/lib/approvals/compare-with-approvals';
import type { ValueNumbers } from '@/lib/approvals/to-compared-value';
import { findOutdated } from '@/lib/locks/list-outdated';
import { massWords } from '@/lib/rules/mass-words';
import { isWithinTolerance, verdictWords } from '@/lib/rules/verdict';
import type { Show } from '@/lib/shows/get-show-access';

/** What a new version moved beyond the show's tolerance: a part against one approved value, and the live locks that hold it. */
export interface Moved {
  partId: string;
  assetId: string;
  asset: string;
  part: string;
  /** Label of the asset's new version. */
  version: string;
  verdict: string;
  /** The value it is held against, such as `585.1 kg (v012)`. */
  against: string;
  locks: { id: string; shotId: string; shot: string }[];
}

interface Touched extends Record<string, unknown> {
  part_id: string;
  asset_id: string;
  version: string;
}

/** What the versions of an import moved; of its files that ended after `since`, where that is given. By asset and part. */
export async function findMoved(tx: Transaction, show: Show, importId: string, since: string | null): Promise<Moved[]> {
  const touched = new Map((await findTouched(tx, importId, since)).map((one) => [one.part_id, one]));
  if (touched.size === 0) return [];
  const moved = new Map<string, Moved>();
  const ids = sql.param([...touched.keys()]);
  const outdated = (await findOutdated(tx, show, sql`l.part_id = any(${ids}::uuid[])`)).filter((one) => one.beyond_tolerance);
  const shotIds = await shotIdsOf(tx, outdated.map((one) => one.lock));
  for (const one of outdated) {
    const { asset_id: assetId, version } = touched.get(one.part_id)!;
    const key = `${one.part_id} ${one.locked.value_id} ${one.verdict}`;
    const entry = moved.get(key) ?? { partId: one.part_id, assetId, asset: one.asset, part: one.part ?? one.body ?? '', version, verdict: one.verdict, against: one.locked.mass_kg === null ? one.locked.version : `${massWords(one.locked.mass_kg)} (${one.locked.version})`, locks: [] };
    entry.locks.push({ id: one.lock, shotId: shotIds.get(one.lock)!, shot: one.shot });
    moved.set(key, entry);
  }
  for (const one of await findMovedFromApproved(tx, show, [...touched.keys()])) {
    // The same value that locks hold is told with them.
    if (![...moved.keys()].some((key) => key.startsWith(`${one.partId} ${one.valueId} `))) moved.set(`${one.partId} ${one.valueId}`, { ...one, ...pick(touched.get(one.partId)!) });
  }
  return [...moved.values()].sort((a, b) => (`${a.asset} ${a.part}` < `${b.asset} ${b.part}` ? -1 : 1));
}

const pick = ({ asset_id: assetId, version }: Touched) => ({ assetId, version });

/** Parts whose value the import's versions wrote, and those that they no longer have and the version before had. */
async function findTouched(tx: Transaction, importId: string, since: string | null): Promise<Touched[]> {
  const { rows } = await tx.execute<Touched>(sql`
    with fresh as (
      select v.id, v.asset_id, f.ended_at from asset_versions v join import_files f on f.id = v.import_file_id
      where f.import_id = ${importId} and (${since}::timestamptz is null or f.ended_at > ${since}::timestamptz)
    ), now_current as (
      select distinct on (v.asset_id) v.asset_id, v.id, v.label, v.record_id from asset_versions v
      where v.asset_id in (select asset_id from fresh) order by v.asset_id, v.number desc, v.take desc
    ), before as (
      select distinct on (v.asset_id) v.asset_id, v.record_id from asset_versions v
      where v.asset_id in (select asset_id from fresh) and v.id not in (select id from fresh) order by v.asset_id, v.number desc, v.take desc
    )
    select p.id as part_id, p.asset_id, c.label as version
    from now_current c join parts p on p.asset_id = c.asset_id
    where c.id in (select id from fresh) and (
      exists (select 1 from value_setters s join fresh on fresh.asset_id = p.asset_id and fresh.ended_at = s.at where s.part_id = p.id and s.act = 'version')
      or (not exists (select 1 from part_current r where r.part_id = p.id)
        and exists (select 1 from before b join geometry_parts g on g.record_id = b.record_id join parts n on n.asset_id = b.asset_id and n.name = g.name
          where b.asset_id = p.asset_id and coalesce(n.merged_into, n.id) = p.id)))`);
  return rows;
}

async function shotIdsOf(tx: Transaction, lockIds: readonly string[]): Promise<Map<string, string>> {
  if (lockIds.length === 0) return new Map();
  const { rows } = await tx.execute<{ id: string; shot_id: string }>(sql`select id, shot_id from locks where id = any(${sql.param(lockIds)}::uuid[])`);
  return new Map(rows.map((row) => [row.id, row.shot_id]));
}

interface FromApproved extends Record<string, unknown> {
  part_id: string;
  value_id: string;
  asset: string;
  part: string;
  approved_version: string;
  before: ValueNumbers;
  after: ValueNumbers | null;
  present: boolean;
}

/** Parts against their newest standing approval, where they moved beyond tolerance or have no value any more. */
async function findMovedFromApproved(tx: Transaction, show: Show, partIds: readonly string[]): Promise<(Omit<Moved, 'assetId' | 'version'> & { valueId: string })[]> {
  const { rows } = await tx.execute<FromApproved>(sql`
    select distinct on (a.part_id) a.part_id, a.id as value_id, a.asset, a.part, a.version as approved_version, ${numbersOf('a')} as before,
      case when c.mass_kg is not null then ${numbersOf('c')} end as after, c.part_id is not null as present
    from approvals a left join part_current c on c.part_id = a.part_id
    where a.part_id = any(${sql.param(partIds)}::uuid[]) and a.shot_id is null and a.value_sha256 is distinct from c.value_sha256
      and c.state is distinct from 'approved' and c.state is distinct from 'left_out'
      and not exists (select 1 from withdrawals w where w.approval_id = a.id)
    order by a.part_id, a.ordinal desc`);
  return rows.flatMap((row) => {
    const differences = row.after === null ? null : compareNumbers(row.before, row.after);
    if (differences !== null && isWithinTolerance(differences, show)) return [];
    const verdict = differences !== null ? verdictWords(differences, show.linearUnit) : row.present ? 'no value any more' : 'not in the current version';
    return [{ partId: row.part_id, valueId: row.value_id, asset: row.asset, part: row.part, verdict, against: `${massWords(row.before.mass_kg)} (${row.approved_version})`, locks: [] }];
  });
}
