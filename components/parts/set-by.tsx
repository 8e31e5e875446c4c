'use client';

import type { PartRow } from '@/lib/rules/part-row';
import { setByWords } from '@/lib/rules/source-words';

const DAY = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
});

/** Who set the value, from where and when. */
export function SetBy({ row }: { row: PartRow }) {
  const words = setByWords(row);
  if (words === null) return null;
  return (
    <p className="text-13 text-ink-3">
      {words}
      {row.set_at === null ? null : (
        <>
          ,{' '}
          <time dateTime={row.set_at} suppressHydrationWarning>
            {DAY.format(new Date(row.set_at))}
          </time>
        </>
      )}
    </p>
  );
}
