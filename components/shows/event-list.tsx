import { When } from '@/components/users/when';
import { actWords, fieldWords, ORIGIN_WORDS } from '@/lib/rules/act-words';
import type { HistoryEvent } from '@/lib/rules/history-event';

/** Acts of a show, each with the fields it changed, before and after. */
export function EventList({ events }: { events: readonly HistoryEvent[] }) {
  return (
    <ol className="flex flex-col">
      {events.map((event) => (
        <li key={event.id} className="grid gap-x-8 gap-y-2 border-b border-rule px-4 py-3 md:grid-cols-[10rem_minmax(0,1fr)] md:px-6">
          <When at={event.at} className="text-13 text-ink-3" />
          <div className="flex min-w-0 flex-col gap-1.5">
            <p className="text-14">
              <span className="font-medium">{event.person?.name ?? 'The command line'}</span> {actWords(event.act)}
              {ORIGIN_WORDS[event.origin] === '' ? null : <span className="text-ink-2"> {ORIGIN_WORDS[event.origin]}</span>}
              <span className="text-ink-2"> · {event.subject}</span>
            </p>
            {event.reason === null ? null : <p className="text-14 text-ink-2">{event.reason}</p>}
            {event.items.length === 0 ? null : <Items event={event} />}
          </div>
        </li>
      ))}
    </ol>
  );
}

function Items({ event }: { event: HistoryEvent }) {
  const rest = event.item_count - event.items.length;
  return (
    <ul className="flex flex-col gap-0.5 text-13 text-ink-2">
      {event.items.map((item, index) => (
        <li key={index} className="flex flex-wrap gap-x-3">
          {item.part === null ? null : <span className="font-mono">{item.part}</span>}
          <span>{fieldWords(item.field)}</span>
          <span className="min-w-0 font-mono break-words text-ink">
            <Value text={item.before} />
            <span aria-hidden className="text-ink-3">
              {' → '}
            </span>
            <span className="sr-only"> became </span>
            <Value text={item.after} />
          </span>
        </li>
      ))}
      {rest > 0 ? <li className="text-ink-3">and {rest.toLocaleString('en')} more</li> : null}
    </ul>
  );
}

function Value({ text }: { text: string | null }) {
  return text === null ? <span className="font-sans text-ink-3">none</span> : <span>{text}</span>;
}
