import { EmptyState } from '@/components/ui/empty-state';
import { Pager } from '@/components/users/pager';
import type { HistoryEvent } from '@/lib/rules/history-event';
import { EventFilters } from './event-filters';
import { EventList } from './event-list';

interface HistoryViewProps {
  show: string;
  events: readonly HistoryEvent[];
  choices: { acts: readonly string[]; people: readonly { name: string; email: string }[] };
  without?: readonly ('part' | 'shot')[];
  newerHref: string | null;
  olderHref: string | null;
}

/** A page of a history under its filters. */
export function HistoryView({ show, events, choices, without = [], newerHref, olderHref }: HistoryViewProps) {
  return (
    <>
      <EventFilters {...choices} without={without} />
      {events.length === 0 ? <EmptyState title="Nothing here">No act fits these filters.</EmptyState> : <EventList show={show} events={events} />}
      <Pager newerHref={newerHref} olderHref={olderHref} />
    </>
  );
}
