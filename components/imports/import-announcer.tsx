'use client';

import { useEffect, useState } from 'react';
import type { ImportSummary } from '@/lib/rules/import-answer';
import { importStateWords } from './import-state-words';

/** Failures are said at most so often; the ticks of the counts never. */
const QUIET_MS = 10_000;

const files = (count: number): string => (count === 1 ? '1 file' : `${count.toLocaleString('en')} files`);

/** Says to a screen reader that files failed, that the import was paused or goes on, and how it ended. */
export function ImportAnnouncer({ summary }: { summary: ImportSummary }) {
  const { state, paused, counts } = summary;
  const isOver = state === 'done' || state === 'cancelled';
  const failed = useSettled(counts.failed, isOver ? 0 : QUIET_MS);
  const [first] = useState({ state, paused, failed: counts.failed });
  const isAsFound = first.state === state && first.paused === paused && first.failed === failed;
  const words = isOver
    ? `The import is ${importStateWords(summary)}. ${files(counts.done)} measured, ${counts.failed.toLocaleString('en')} failed.`
    : [paused ? 'The import is paused.' : '', failed > 0 ? `${files(failed)} failed so far.` : ''].filter(Boolean).join(' ');
  return (
    <p role="status" aria-live="polite" className="sr-only">
      {isAsFound && !isOver ? '' : words}
    </p>
  );
}

/** A value as it was at the last of these intervals; at once where there is none to wait. */
function useSettled(value: number, ms: number): number {
  const [settled, setSettled] = useState(value);
  useEffect(() => {
    if (settled === value) return;
    const timer = setTimeout(() => setSettled(value), ms);
    return () => clearTimeout(timer);
    // Each new value must not put off the one before it for ever: the timer runs from the first that differs.
  }, [settled, value, ms]);
  return ms === 0 ? value : settled;
}
