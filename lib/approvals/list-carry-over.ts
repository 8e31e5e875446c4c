import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { CarryOverAnswer, CarryOverRow, QueueRow } from '@/lib/rules/approval-queue';
import type { ShowRefInput } from '@/lib/rules/inputs/show-ref';
import { isWithinTolerance, verdictWords } from '@/lib/rules/verdict';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { compareNumbers, numbersOf } from './compare-with-approvals';
import type { ValueNumbers } from './to-compared-value';

interface FoundRow extends Record<string, unknown> {
  asset: string;
  part: string;
  row: QueueRow['row'];
  value_sha256: string;
  before: ValueNumbers;
  after: ValueNumbers;
  own: boolean;
}

/** Parts that are out of date and moved no more than the show's tolerance: what a lead may carry over in one act. One query. */
export async function listCarryOver(context: Context, input: ShowRefInput): Promise<CarryOverAnswer> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'approveValues');
  const { rows } = await db.execute<FoundRow>(sql`
    select c.asset, c.part, c."row", c.value_sha256, ${numbersOf('a')} as before, ${numbersOf('c')} as after,
      exists (select 1 from value_setters v where v.part_id = c.part_id and v.shot_id is null and v.user_id = ${actor.userId} and v.id > a.setter_mark) as own
    from part_current c join approvals a on a.id = c.last_approval_id
    where c.show_id = ${show.id} and c.state = 'outdated'
    order by c.asset collate "C", c.part collate "C"`);
  const answer: CarryOverAnswer = { items: [], own: 0, beyond_tolerance: 0 };
  for (const row of rows) {
    const differences = compareNumbers(row.before, row.after);
    if (!isWithinTolerance(differences, show)) answer.beyond_tolerance += 1;
    else if (row.own && !show.selfApproval) answer.own += 1;
    else answer.items.push({ asset: row.asset, part: row.part, row: row.row, value_sha256: row.value_sha256, verdict: verdictWords(differences, show.linearUnit) } satisfies CarryOverRow);
  }
  return answer;
}
