import Link from 'next/link';
import { When } from '@/components/users/when';
import { actWords, changeWords, fieldWords, ORIGIN_WORDS } from '@/lib/rules/act-words';
import type { HistoryEvent, HistoryItem } from '@/lib/rules/history-event';

/** Acts of a show, each with the fields it changed, before and after. */
export function EventList({ show, events }: { show: string; events: readonly HistoryEvent[] }) {
  return (
    <ol className="flex flex-col">
      {events.map((event) => (
        <li key={event.id} className="grid gap-x-8 gap-y-2 border-b border-rule px-4 py-3 md:grid-cols-[10rem_minmax(0,1fr)] md:px-6">
          <When at={event.at} className="text-13 text-ink-3" />
          <div className="flex min-w-0 flex-col gap-1.5">
            <p className="text-14 break-words">
              <span className="font-medium">{event.person?.name ?? 'The command line'}</span> {actWords(event.act)}
              {ORIGIN_WORDS[event.origin] === '' ? null : <span className="text-ink-2"> {ORIGIN_WORDS[event.origin]}</span>}
              <span className="text-ink-2"> · {event.subject}</span>
            </p>
            {event.reason === null ? null : <p className="text-14 break-words text-ink-2">{event.reason}</p>}
            {event.items.length === 0 ? null : <Items show={show} event={event} />}
          </div>
        </li>
      ))}
    </ol>
  );
}

function Items({ show, event }: { show: string; event: HistoryEvent }) {
  const rest = event.item_count - event.items.length;
  return (
    <ul className="flex flex-col gap-0.5 text-13 text-ink-2">
      {event.items.map((item, index) => (
        <li key={index} className="flex flex-wrap gap-x-3">
          {item.part === null ? null : (
            <Link href={partHistoryHref(show, item.part)} className="link font-mono break-all">
              {item.part}
            </Link>
          )}
          <span>{fieldWords(item.field)}</span>
          <span className="min-w-0 font-mono break-words text-ink">
            <Value item={item} which="before" />
            <span aria-hidden className="text-ink-3">
              {' → '}
            </span>
            <span className="sr-only"> became </span>
            <Value item={item} which="after" />
          </span>
        </li>
      ))}
      {rest > 0 ? <li className="text-ink-3">and {rest.toLocaleString('en')} more</li> : null}
    </ul>
  );
}

function Value({ item, which }: { item: HistoryItem; which: 'before' | 'after' }) {
  const text = item[which];
  const words = item[`${which}_words`];
  if (text === null) return <span className="font-sans text-ink-3">none</span>;
  return <span title={words === null ? undefined : text}>{words ?? changeWords(item.field, text)}</span>;
}

/** A part's own history; `asset/part` is split at the first slash, since a part's name may have others. */
function partHistoryHref(show: string, part: string): string {
  const slash = part.indexOf('/');
  return `/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(part.slice(0, slash))}/${encodeURIComponent(part.slice(slash + 1))}/history`;
}
