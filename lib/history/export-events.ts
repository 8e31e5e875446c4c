import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { csvRecord } from '@/lib/formats/csv';
import type { ExportEventsInput } from '@/lib/rules/inputs/list-events';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { eventCondition, itemCondition } from './event-filter';
import { valueWords } from './value-words';

const PAGE_ROWS = 1000;

const COLUMNS = ['event', 'at_utc', 'person', 'email', 'act', 'origin', 'subject', 'reason', 'asset', 'part', 'shot', 'field', 'before', 'after', 'before_value', 'after_value'] as const;

/**
 * A show's history as CSV (RFC 4180), the newest act first: one record a field that changed, or one for an act without any. Ids of
 * approved values stand as they are in `before` and `after`, with mass (kg) and version in words beside them. Sent page by page as
 * it is read: nothing of a history ever changes, so the pages fit together, and acts that come meanwhile are left out.
 */
export async function exportEvents(context: Context, input: ExportEventsInput): Promise<Response> {
  const { actor, db } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readHistory');
  const pages = eventPages(db, show.id, input);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>(
    {
      start: (controller) => controller.enqueue(encoder.encode(csvRecord([...COLUMNS], { guard: false }))),
      async pull(controller) {
        const { done, value } = await pages.next();
        if (done) controller.close();
        else controller.enqueue(encoder.encode(value));
      },
    },
    { highWaterMark: 0 },
  );
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8; header=present',
      'content-disposition': `attachment; filename="${show.code}_history.csv"`,
      'cache-control': 'no-store',
      'x-content-type-options': 'nosniff',
    },
  });
}

interface Found extends Record<string, unknown> {
  event: string;
  at_utc: string;
  person: string | null;
  email: string | null;
  act: string;
  origin: string;
  subject: string;
  reason: string | null;
  asset: string | null;
  part: string | null;
  shot: string | null;
  field: string;
  before: string | null;
  after: string | null;
  item: string;
}

async function* eventPages(db: Database, showId: string, input: ExportEventsInput): AsyncGenerator<string> {
  const condition = eventCondition(showId, input);
  const ofItems = itemCondition(showId, input);
  const [newest] = (await db.execute<{ id: string | null }>(sql`select max(e.id) as id from audit_events e where ${condition}`)).rows;
  let behind = newest.id === null ? null : { event: newest.id, item: '-1' };
  while (behind !== null) {
    const after: { event: string; item: string } = behind;
    const { rows } = await db.execute<Found>(sql`
      select e.id as event, to_char(e.at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at_utc, u.name as person, u.email, e.act, e.origin, e.subject, e.reason,
        a.code as asset, p.name as part, s.code as shot, coalesce(i.field, '') as field, i.before, i.after, coalesce(i.id, 0) as item
      from audit_events e
      left join audit_items i on i.event_id = e.id ${ofItems === null ? sql`` : sql`and (e.act = 'import-version' or (${ofItems}))`}
      left join users u on u.id = e.actor_id
      left join parts p on p.id = i.part_id left join assets a on a.id = p.asset_id left join shots s on s.id = i.shot_id
      where ${condition} and (e.id < ${after.event}::bigint or (e.id = ${after.event}::bigint and coalesce(i.id, 0) > ${after.item}::bigint))
      order by e.id desc, i.id limit ${PAGE_ROWS}`);
    const words = await valueWords(db, rows);
    const wordsOf = (text: string | null): string | null => (text === null ? null : (words.get(text) ?? null));
    const records = rows.map((row) => COLUMNS.map((name) => (name === 'before_value' ? wordsOf(row.before) : name === 'after_value' ? wordsOf(row.after) : row[name])));
    if (records.length > 0) yield records.map((record) => csvRecord(record, { guard: input.guard === '1' })).join('');
    const last = rows.at(-1);
    behind = rows.length < PAGE_ROWS || !last ? null : { event: last.event, item: last.item };
  }
}
