import { sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { findOutdated } from '@/lib/locks/list-outdated';
import type { SequenceRefInput } from '@/lib/rules/inputs/shot-ref';
import type { SequenceCell, SequenceDetail, SequenceShot } from '@/lib/rules/shot-detail';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { assetStanding } from './shot-standing';

interface FoundCell extends SequenceCell, Record<string, unknown> {
  code: string;
  title: string | null;
  asset: string | null;
}

/** A sequence's shots and the assets in them, with what is locked, missing and out of date in each; throws not_found. */
export async function getSequence(context: Context, input: SequenceRefInput): Promise<SequenceDetail> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const chosen = sql`select id from shots where show_id = ${show.id} and sequence = ${input.sequence}`;
  return db.transaction(
    async (tx) => {
      const { rows } = await tx.execute<FoundCell>(sql`
        select s.code, s.title, a.code as asset, t.copies, t.locked, t.missing, t.outdated, t.overrides
        from shots s
        left join (${assetStanding(show.id, chosen)}) t on t.shot_id = s.id
        left join assets a on a.id = t.asset_id
        where s.show_id = ${show.id} and s.sequence = ${input.sequence}
        order by s.code collate "C", a.code collate "C"`);
      if (rows.length === 0) throw new StudioError('not_found', `There is no sequence ${input.sequence}.`);
      const shots = toShots(rows);
      const sum = (key: 'locked' | 'missing' | 'outdated') => shots.reduce((total, shot) => total + shot[key], 0);
      return {
        sequence: input.sequence,
        assets: [...new Set(rows.flatMap((row) => row.asset ?? []))].sort(),
        shots,
        locked: sum('locked'),
        missing: sum('missing'),
        outdated: sum('outdated'),
        outdated_locks: await findOutdated(tx, show, sql`s.sequence = ${input.sequence}`),
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

function toShots(rows: readonly FoundCell[]): SequenceShot[] {
  const shots = new Map<string, SequenceShot>();
  for (const { code, title, asset, ...cell } of rows) {
    const shot = shots.get(code) ?? { code, title, locked: 0, missing: 0, outdated: 0, cells: {} };
    shots.set(code, shot);
    if (asset === null) continue;
    shot.cells[asset] = cell;
    shot.locked += cell.locked;
    shot.missing += cell.missing;
    shot.outdated += cell.outdated;
  }
  return [...shots.values()];
}
