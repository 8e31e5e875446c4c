'use client';

import { useEffect, useEffectEvent, useState } from 'react';
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

/** A value as it was at the last of these intervals, each begun by the first change after the one before; at once where there is none to wait. */
function useSettled(value: number, ms: number): number {
  const [settled, setSettled] = useState(value);
  const settle = useEffectEvent(() => setSettled(value));
  const differs = settled !== value;
  useEffect(() => {
    if (!differs) return;
    const timer = setTimeout(() => settle(), ms);
    return () => clearTimeout(timer);
  }, [differs, ms]);
  return ms === 0 ? value : settled;
}
