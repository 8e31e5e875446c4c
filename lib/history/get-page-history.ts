import type { ActorContext } from '@/lib/context';
import type { HistoryEvent } from '@/lib/rules/history-event';
import { listEventsInput, type ListEventsInput } from '@/lib/rules/inputs/list-events';
import { listEventFilters } from './list-event-filters';
import { listEvents } from './list-events';

/** What the address of a page asks for, as Next hands it over. */
export type SearchParams = Record<string, string | string[] | undefined>;

export interface PageHistory {
  show: string;
  events: HistoryEvent[];
  choices: { acts: string[]; people: { name: string; email: string }[] };
  newerHref: string | null;
  olderHref: string | null;
  /** Of the CSV of all that the filters let through; text cells guarded, since a person opens it in a spreadsheet. */
  csvHref: string;
}

const ASKED = ['act', 'person', 'part', 'shot', 'from', 'to'] as const;

/**
 * A history for its page: filters come from the address, where one that cannot be read counts as none at all, and what the page is
 * about is fixed.
 */
export async function getPageHistory(context: ActorContext, show: string, asked: SearchParams, about: Partial<Pick<ListEventsInput, 'asset' | 'part' | 'shot'>> = {}): Promise<PageHistory> {
  const said = Object.fromEntries(ASKED.flatMap((name) => (typeof asked[name] === 'string' && asked[name] !== '' && !(name in about) ? [[name, asked[name]]] : [])));
  const before = typeof asked.before === 'string' && asked.before !== '' ? asked.before : undefined;
  const parsed = listEventsInput.safeParse({ show, ...said, ...about, before });
  const input = parsed.success ? parsed.data : listEventsInput.parse({ show, ...about });
  const kept = parsed.success ? said : {};
  const [{ items, next }, choices] = await Promise.all([listEvents(context, input), listEventFilters(context, show)]);
  const hrefOf = (from: number | null): string => `?${new URLSearchParams({ ...kept, ...(from === null ? {} : { before: String(from) }) })}`;
  return {
    show,
    events: items,
    choices,
    newerHref: input.before === undefined ? null : hrefOf(null),
    olderHref: next === null ? null : hrefOf(next),
    csvHref: `/api/v1/shows/${encodeURIComponent(show)}/history.csv?${new URLSearchParams({ ...kept, ...about, guard: '1' })}`,
  };
}
