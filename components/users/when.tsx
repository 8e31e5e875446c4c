'use client';

import { useSyncExternalStore } from 'react';

const never = () => () => undefined;

/** A moment in the reader's own zone; in UTC until the page is alive. The full moment is its title. */
export function When({ at, dateOnly = false, className }: { at: string; dateOnly?: boolean; className?: string }) {
  const local = useSyncExternalStore(
    never,
    () => written(at, dateOnly, undefined),
    () => written(at, dateOnly, 'UTC'),
  );
  return (
    <time dateTime={at} title={at} className={className}>
      {local}
    </time>
  );
}

function written(at: string, dateOnly: boolean, timeZone: string | undefined): string {
  const date = new Date(at);
  const day = date.toLocaleDateString('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone });
  if (dateOnly) return day;
  return `${day}, ${date.toLocaleTimeString('en-GB', { hour: '2-digit', minute: '2-digit', timeZone })}`;
}
