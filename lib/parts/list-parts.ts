import { and, sql } from 'drizzle-orm';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListPartsInput } from '@/lib/rules/inputs/list-parts';
import type { PartPage } from '@/lib/rules/part-row';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { assetTotals } from './asset-totals';
import { partCounts } from './part-counts';
import { decodeCursor } from './part-cursor';
import { partFilter } from './part-filter';
import { partOrder } from './part-order';
import { partRowsWithFindings } from './part-rows-with-findings';
import { ROW_COLUMNS, type StoredRow } from './row-columns';

/**
 * A page of a show's parts with their findings, the totals of the assets on it, and with the first page the show's counts.
 * Errors: not_found for outsiders and guests, bad_input naming the field for what the query cannot say.
 */
export async function listParts(context: Context, input: ListPartsInput): Promise<PartPage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { orderBy, after, cursorOf } = partOrder(input.sort);
  const cursor = input.cursor === undefined ? null : decodeCursor(input.cursor, input.sort);
  return db.transaction(
    async (tx) => {
      const condition = and(partFilter(show.id, input), cursor ? after(cursor) : undefined);
      const stored = await tx.execute<StoredRow>(sql`select ${ROW_COLUMNS} from part_current where ${condition} order by ${orderBy} limit ${input.limit + 1}`);
      const rows = stored.rows.slice(0, input.limit);
      const [{ revision }] = (await tx.execute<{ revision: string }>(sql`select revision from shows where id = ${show.id}`)).rows;
      return {
        items: await partRowsWithFindings(tx, show.code, rows),
        assets: await assetTotals(tx, [...new Set(rows.map((row) => row.asset_id))]),
        counts: cursor ? null : await partCounts(tx, show.id),
        revision: Number(revision),
        next_cursor: stored.rows.length > input.limit ? cursorOf(rows[rows.length - 1]) : null,
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}
