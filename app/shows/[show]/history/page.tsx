import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { EventFilters } from '@/components/shows/event-filters';
import { EventList } from '@/components/shows/event-list';
import { EmptyState } from '@/components/ui/empty-state';
import { Pager } from '@/components/users/pager';
import { listEventFilters } from '@/lib/history/list-event-filters';
import { listEvents } from '@/lib/history/list-events';
import { listEventsInput } from '@/lib/rules/inputs/list-events';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'History' };

interface HistoryPageProps {
  params: Promise<{ show: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function HistoryPage({ params, searchParams }: HistoryPageProps) {
  const { context, access } = await getPageShow((await params).show, 'readHistory');
  const { code } = access.show;
  const asked = await searchParams;
  const text = (name: string) => (typeof asked[name] === 'string' ? asked[name] : undefined);
  const parsed = listEventsInput.safeParse({ show: code, act: text('act'), person: text('person'), part: text('part'), before: text('before') });
  const input = parsed.success ? parsed.data : listEventsInput.parse({ show: code });
  const [{ items, next }, filters] = await Promise.all([listEvents(context, input), listEventFilters(context, code)]);
  return (
    <>
      <PageHeading title="History" />
      <EventFilters {...filters} />
      {items.length === 0 ? <EmptyState title="Nothing here">No act fits these filters.</EmptyState> : <EventList events={items} />}
      <Pager newerHref={input.before ? hrefOf(input, null) : null} olderHref={next === null ? null : hrefOf(input, next)} />
    </>
  );
}

function hrefOf({ act, person, part }: { act: string; person: string; part: string }, before: number | null): string {
  const query = new URLSearchParams(Object.entries({ act, person, part, before: before?.toString() ?? '' }).filter(([, value]) => value !== ''));
  return `?${query}`;
}
