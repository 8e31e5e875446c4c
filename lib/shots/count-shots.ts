import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListShotsInput } from '@/lib/rules/inputs/list-shots';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { shotFilter } from './shot-filter';
import { shotStanding } from './shot-standing';

export interface ShotCounts {
  shots: number;
  sequences: number;
  complete: number;
  missing: number;
  outdated: number;
}

/** How many shots the words let through, whatever their state, and how many of them are complete, lack something or are out of date. */
export async function countShots(context: Context, input: Pick<ListShotsInput, 'show' | 'asset' | 'q'>): Promise<ShotCounts> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { rows } = await db.execute<ShotCounts & Record<string, unknown>>(sql`
    with chosen as materialized (select s.id, s.sequence from shots s where ${shotFilter(show.id, input)}),
      standing as materialized (${shotStanding(show.id, sql`select id from chosen`)})
    select count(*)::int as shots, count(distinct s.sequence)::int as sequences,
      count(*) filter (where t.missing > 0)::int as missing, count(*) filter (where t.outdated > 0)::int as outdated,
      count(*) filter (where t.missing = 0 and t.outdated = 0 and t.locked > 0)::int as complete
    from chosen s left join standing t on t.shot_id = s.id`);
  return rows[0];
}
