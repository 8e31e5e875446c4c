import { and, asc, desc, eq, exists, ilike, inArray, lt, or, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { assets } from '@/db/schema/assets';
import { auditEvents } from '@/db/schema/audit-events';
import { auditItems } from '@/db/schema/audit-items';
import { parts } from '@/db/schema/parts';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { HistoryEvent, HistoryItem } from '@/lib/rules/history-event';
import type { ListEventsInput } from '@/lib/rules/inputs/list-events';
import { getShowAccess } from '@/lib/shows/get-show-access';

const EVENTS_PER_PAGE = 50;
const ITEMS_SHOWN = 20;

/** What happened in a show, the newest first. `next` continues with older ones. */
export async function listEvents(context: Context, input: ListEventsInput): Promise<{ items: HistoryEvent[]; next: number | null }> {
  const { actor, db } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readHistory');
  const rows = await db
    .select({ event: auditEvents, name: users.name, email: users.email })
    .from(auditEvents)
    .leftJoin(users, eq(users.id, auditEvents.actorId))
    .where(
      and(
        eq(auditEvents.showId, show.id),
        input.act ? eq(auditEvents.act, input.act) : undefined,
        input.person ? sql`lower(${users.email}) = lower(${input.person})` : undefined,
        input.part ? touches(db, input.part) : undefined,
        input.before ? lt(auditEvents.id, input.before) : undefined,
      ),
    )
    .orderBy(desc(auditEvents.id))
    .limit(EVENTS_PER_PAGE + 1);
  const page = rows.slice(0, EVENTS_PER_PAGE);
  const items = await itemsOf(db, page.map((row) => row.event.id));
  const events = page.map(({ event, name, email }) => ({
    id: event.id,
    act: event.act,
    subject: event.subject,
    reason: event.reason,
    origin: event.origin,
    person: name !== null && email !== null ? { name, email } : null,
    at: event.at.toISOString(),
    item_count: event.items,
    items: items.get(event.id) ?? [],
  }));
  return { items: events, next: rows.length > EVENTS_PER_PAGE ? events[events.length - 1].id : null };
}

/** Events with an item about a part whose name, or whose `asset/part`, contains the text. */
function touches(db: Database, text: string) {
  const like = `%${text.replace(/[\\%_]/g, '\\$&')}%`;
  return exists(
    db
      .select({ one: sql`1` })
      .from(auditItems)
      .innerJoin(parts, eq(parts.id, auditItems.partId))
      .innerJoin(assets, eq(assets.id, parts.assetId))
      .where(and(eq(auditItems.eventId, auditEvents.id), or(ilike(parts.name, like), ilike(sql`${assets.code} || '/' || ${parts.name}`, like)))),
  );
}

/** The first items of each event. */
async function itemsOf(db: Database, eventIds: number[]): Promise<Map<number, HistoryItem[]>> {
  const found = new Map<number, HistoryItem[]>();
  if (eventIds.length === 0) return found;
  const numbered = db
    .select({
      id: auditItems.id,
      eventId: auditItems.eventId,
      partId: auditItems.partId,
      field: auditItems.field,
      before: auditItems.before,
      after: auditItems.after,
      place: sql<number>`row_number() over (partition by ${auditItems.eventId} order by ${auditItems.id})`.as('place'),
    })
    .from(auditItems)
    .where(inArray(auditItems.eventId, eventIds))
    .as('numbered');
  const rows = await db
    .select({ eventId: numbered.eventId, field: numbered.field, before: numbered.before, after: numbered.after, asset: assets.code, part: parts.name })
    .from(numbered)
    .leftJoin(parts, eq(parts.id, numbered.partId))
    .leftJoin(assets, eq(assets.id, parts.assetId))
    .where(sql`${numbered.place} <= ${ITEMS_SHOWN}`)
    .orderBy(asc(numbered.id));
  for (const { eventId, asset, part, ...change } of rows) {
    const list = found.get(eventId) ?? [];
    list.push({ part: asset !== null && part !== null ? `${asset}/${part}` : null, ...change });
    found.set(eventId, list);
  }
  return found;
}
