const FORMAT = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
});

/** A point in time on the reader's own clock; the server's differs, so the first writing may be replaced. */
export function Moment({ at }: { at: string }) {
  return (
    <time dateTime={at} suppressHydrationWarning>
      {FORMAT.format(new Date(at))}
    </time>
  );
}
