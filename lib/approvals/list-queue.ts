import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { QueueCounts, QueuePage } from '@/lib/rules/approval-queue';
import type { ListQueueInput } from '@/lib/rules/inputs/list-queue';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { decodeQueueCursor, encodeQueueCursor } from './queue-cursor';
import { QUEUE_CONDITIONS, queueValues } from './queue-values';
import { readQueueRows } from './read-queue-rows';

interface Place extends Record<string, unknown> {
  part_id: string;
  shot_id: string | null;
  shot: string;
  asset: string;
  part: string;
  asked: boolean;
  asset_asked: boolean;
}

/**
 * A page of the approvals queue, grouped by asset: assets of which something is asked for come first, and within an asset what is
 * asked for; then by name. Three queries a page, four for the first.
 * Errors: not_found for outsiders and guests, bad_input for a cursor of another list.
 */
export async function listQueue(context: Context, input: ListQueueInput): Promise<QueuePage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const cursor = input.cursor === undefined ? null : decodeQueueCursor(input.cursor, input.state);
  return db.transaction(
    async (tx) => {
      const places = await findPlaces(tx, show.id, input, cursor);
      const page = places.slice(0, input.limit);
      const items = await readQueueRows(tx, show, actor, page.map((place) => ({ partId: place.part_id, shotId: place.shot_id })));
      const last = page.at(-1);
      return {
        items,
        counts: cursor ? null : await queueCounts(tx, show.id),
        next_cursor: places.length > input.limit && last ? encodeQueueCursor({ ...last, state: input.state, assetAsked: last.asset_asked }) : null,
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

/** One more than the page, to know whether another follows. Order: what is asked for first, so the flags are turned round. */
async function findPlaces(db: Executor, showId: string, input: ListQueueInput, cursor: ReturnType<typeof decodeQueueCursor> | null): Promise<Place[]> {
  const after = cursor
    ? sql`where (not asset_asked, asset collate "C", not asked, part collate "C", shot collate "C") > (${!cursor.assetAsked}::boolean, ${cursor.asset}::text, ${!cursor.asked}::boolean, ${cursor.part}::text, ${cursor.shot}::text)`
    : sql``;
  const { rows } = await db.execute<Place>(sql`
    select * from (
      select part_id, shot_id, shot, asset, part, asked, bool_or(asked) over (partition by asset) as asset_asked
      from (${queueValues(showId)}) found where ${QUEUE_CONDITIONS[input.state]}
    ) ranked ${after}
    order by not asset_asked, asset collate "C", not asked, part collate "C", shot collate "C" limit ${input.limit + 1}`);
  return rows;
}

async function queueCounts(db: Executor, showId: string): Promise<QueueCounts> {
  const count = (filter: keyof QueueCounts) => sql`count(*) filter (where ${QUEUE_CONDITIONS[filter]})::integer`;
  const { rows } = await db.execute<Record<keyof QueueCounts, number>>(sql`
    select ${count('waiting')} as waiting, ${count('asked')} as asked, ${count('outdated')} as outdated, ${count('approved')} as approved
    from (${queueValues(showId)}) found`);
  return rows[0];
}
