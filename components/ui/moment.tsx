const FORMAT = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
});

const DAY = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });

/** A point in time on the reader's own clock, or its day alone; the server's differs, so the first writing may be replaced. */
export function Moment({ at, day = false }: { at: string; day?: boolean }) {
  return (
    <time dateTime={at} suppressHydrationWarning>
      {(day ? DAY : FORMAT).format(new Date(at))}
    </time>
  );
}
