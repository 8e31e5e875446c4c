import { sql, type SQL } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { compareNumbers, numbersOf } from '@/lib/approvals/compare-with-approvals';
import type { ValueNumbers } from '@/lib/approvals/to-compared-value';
import { toDifferencesAnswer } from '@/lib/approvals/to-differences-answer';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ShowRefInput } from '@/lib/rules/inputs/show-ref';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import { isWithinTolerance, verdictWords } from '@/lib/rules/verdict';
import { getShowAccess, type Show } from '@/lib/shows/get-show-access';
import { APPROVAL_OF_OVERRIDE, LOCK_IS_OUTDATED, NOW_OF_LOCK } from './lock-standing';

/** Every live lock of the show whose part has another value by now, or none, with the differences. */
export async function listOutdated(context: Context, input: ShowRefInput): Promise<{ items: OutdatedLock[] }> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  return { items: await findOutdated(db, show, sql`true`) };
}

interface Found extends Record<string, unknown> {
  lock: string;
  shot: string;
  sequence: string;
  copy: string;
  asset: string;
  part: string;
  row: string;
  part_id: string;
  locked_version: string;
  locked_value_id: string;
  locked_sha256: string;
  before: ValueNumbers;
  present: boolean;
  version: string | null;
  state: OutdatedLock['state'];
  value_sha256: string | null;
  value_id: string | null;
  after: ValueNumbers;
}

/**
 * Live locks that are out of date, by sequence, shot, asset and part. A lock of an override is measured against the override that
 * stands: new versions of the asset do not touch it. `where` narrows over the aliases l (locks), s (shots) and a (the approval).
 */
export async function findOutdated(db: Executor, show: Show, where: SQL): Promise<OutdatedLock[]> {
  const { rows } = await db.execute<Found>(sql`
    select l.id as lock, s.code as shot, s.sequence, l.copy, a.asset, q.name as part, a."row", a.part_id, a.version as locked_version, a.id as locked_value_id, a.value_sha256 as locked_sha256,
      ${numbersOf('a')} as before, coalesce(o.id, c.part_id) is not null as present, coalesce(o.version, c.version) as version,
      case when o.id is null then c.state when n.id is not null then 'approved' else o.state end as state,
      case when o.id is null then c.value_sha256 else o.value_sha256 end as value_sha256, case when o.id is null then c.value_id else n.id end as value_id,
      case when o.id is null then ${numbersOf('c')} else ${numbersOf('o')} end as after
    from locks l
    join shots s on s.id = l.shot_id
    join approvals a on a.id = l.approval_id
    join parts q on q.id = l.part_id
    ${NOW_OF_LOCK} ${APPROVAL_OF_OVERRIDE}
    where l.show_id = ${show.id} and l.unlocked_at is null and ${where} and ${LOCK_IS_OUTDATED}
    order by s.sequence collate "C", s.code collate "C", a.asset collate "C", q.name collate "C", l.copy`);
  return rows.map((row) => toOutdated(show, row));
}

function toOutdated(show: Show, row: Found): OutdatedLock {
  const differences = row.value_sha256 === null ? null : compareNumbers(row.before, row.after);
  return {
    lock: row.lock,
    shot: row.shot,
    sequence: row.sequence,
    copy: row.copy || null,
    asset: row.asset,
    part: row.row === 'body' ? null : row.part,
    body: row.row === 'body' ? row.part : null,
    part_id: row.part_id,
    why: row.present ? (row.value_sha256 === null ? 'no_value' : 'changed') : 'absent',
    locked: { version: row.locked_version, value_id: row.locked_value_id, value_sha256: row.locked_sha256, mass_kg: row.before.mass_kg },
    current: row.present ? { version: row.version ?? '', value_id: row.value_id, value_sha256: row.value_sha256, mass_kg: row.value_sha256 === null ? null : row.after.mass_kg } : null,
    state: row.present ? row.state : null,
    verdict: !row.present ? 'not in the current version' : differences === null ? 'no value any more' : verdictWords(differences, show.linearUnit),
    beyond_tolerance: differences === null || !isWithinTolerance(differences, show),
    differences: differences && toDifferencesAnswer(differences),
  };
}
