import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { HistoryEvent, HistoryItem } from '@/lib/rules/history-event';
import type { ListEventsInput } from '@/lib/rules/inputs/list-events';
import type { Origin } from '@/lib/rules/states';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { eventCondition, itemCondition } from './event-filter';
import { valueWords } from './value-words';

const EVENTS_PER_PAGE = 50;
const ITEMS_SHOWN = 20;

interface FoundEvent extends Record<string, unknown> {
  id: string;
  act: string;
  subject: string;
  reason: string | null;
  origin: Origin;
  name: string | null;
  email: string | null;
  at: string;
}

/** What happened in a show, the newest first. `next` continues with older ones. */
export async function listEvents(context: Context, input: ListEventsInput): Promise<{ items: HistoryEvent[]; next: number | null }> {
  const { actor, db } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readHistory');
  const { rows } = await db.execute<FoundEvent>(sql`
    select e.id, e.act, e.subject, e.reason, e.origin, u.name, u.email, to_char(e.at at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at
    from audit_events e left join users u on u.id = e.actor_id
    where ${eventCondition(show.id, input)} ${input.before === undefined ? sql`` : sql`and e.id < ${input.before}`}
    order by e.id desc limit ${EVENTS_PER_PAGE + 1}`);
  const page = rows.slice(0, EVENTS_PER_PAGE);
  const items = await itemsOf(db, show.id, input, page.map((row) => Number(row.id)));
  const events = page.map(({ id, name, email, ...event }): HistoryEvent => {
    const found = items.get(Number(id));
    return { ...event, id: Number(id), person: name !== null && email !== null ? { name, email } : null, item_count: found?.count ?? 0, items: found?.items ?? [] };
  });
  return { items: events, next: rows.length > EVENTS_PER_PAGE ? events[events.length - 1].id : null };
}

interface FoundItem extends Record<string, unknown> {
  event_id: string;
  part: string | null;
  shot: string | null;
  field: string;
  before: string | null;
  after: string | null;
  count: number;
}

/** The first items of each event that the filter is about, and how many there are. */
async function itemsOf(db: Database, showId: string, input: ListEventsInput, eventIds: number[]): Promise<Map<number, { count: number; items: HistoryItem[] }>> {
  const found = new Map<number, { count: number; items: HistoryItem[] }>();
  if (eventIds.length === 0) return found;
  const condition = itemCondition(showId, input);
  const { rows } = await db.execute<FoundItem>(sql`
    select n.event_id, a.code || '/' || p.name as part, s.code as shot, n.field, n.before, n.after, n.count
    from (
      select i.*, row_number() over (partition by i.event_id order by i.id) as place, (count(*) over (partition by i.event_id))::int as count
      from audit_items i join audit_events e on e.id = i.event_id
      where i.event_id = any(${sql.param(eventIds)}::bigint[]) ${condition === null ? sql`` : sql`and (e.act = 'import-version' or (${condition}))`}
    ) n
    left join parts p on p.id = n.part_id left join assets a on a.id = p.asset_id left join shots s on s.id = n.shot_id
    where n.place <= ${ITEMS_SHOWN}
    order by n.id`);
  const words = await valueWords(db, rows);
  const wordsOf = (text: string | null): string | null => (text === null ? null : (words.get(text) ?? null));
  for (const { event_id: eventId, count, ...item } of rows) {
    const event = found.get(Number(eventId)) ?? { count, items: [] };
    event.items.push({ ...item, before_words: wordsOf(item.before), after_words: wordsOf(item.after) });
    found.set(Number(eventId), event);
  }
  return found;
}
