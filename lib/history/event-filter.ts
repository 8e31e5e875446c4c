import { sql, type SQL } from 'drizzle-orm';
import type { ListEventsInput } from '@/lib/rules/inputs/list-events';

export type EventFilter = Pick<ListEventsInput, 'act' | 'person' | 'part' | 'asset' | 'shot' | 'from' | 'to'>;

/** The acts of one show that a filter lets through, over `audit_events e`: the one place where the show's scope is set for readers of the history. */
export function eventCondition(showId: string, filter: EventFilter): SQL {
  const { act, person, asset, from, to } = filter;
  const conditions = [sql`e.show_id = ${showId}`];
  if (act) conditions.push(sql`e.act = ${act}`);
  if (person) conditions.push(sql`exists (select 1 from users u where u.id = e.actor_id and lower(u.email) = lower(${person}))`);
  if (from) conditions.push(sql`e.at >= ${from}::date::timestamp at time zone 'utc'`);
  if (to) conditions.push(sql`e.at < (${to}::date + 1)::timestamp at time zone 'utc'`);
  const items = itemCondition(showId, filter);
  if (items) {
    const touched = sql`exists (select 1 from audit_items i where i.event_id = e.id and ${items})`;
    // A version concerns every part of its asset, and has no item for each.
    conditions.push(asset ? sql`(${touched} or (e.act = 'import-version' and e.subject = ${asset}))` : touched);
  }
  return sql.join(conditions, sql` and `);
}

/** Which items of an act a filter is about, over `audit_items i`; null for all. */
export function itemCondition(showId: string, { part, asset, shot }: Pick<EventFilter, 'part' | 'asset' | 'shot'>): SQL | null {
  const conditions: SQL[] = [];
  if (shot) conditions.push(sql`i.shot_id in (select s.id from shots s where s.show_id = ${showId} and lower(s.code) = lower(${shot}))`);
  if (asset) conditions.push(sql`i.part_id in (select p.id from parts p join assets a on a.id = p.asset_id where a.show_id = ${showId} and a.code = ${asset} ${part ? sql`and (p.name = ${part} or p.merged_into = (select m.id from parts m where m.asset_id = a.id and m.name = ${part}))` : sql``})`);
  else if (part) {
    const like = `%${part.replace(/[\\%_]/g, '\\$&')}%`;
    conditions.push(sql`i.part_id in (select p.id from parts p join assets a on a.id = p.asset_id where a.show_id = ${showId} and (p.name ilike ${like} or a.code || '/' || p.name ilike ${like}))`);
  }
  return conditions.length > 0 ? sql.join(conditions, sql` and `) : null;
}
