import Link from 'next/link';
import type { LiveTrouble } from '@/hooks/use-import-live';
import type { ImportSummary } from '@/lib/rules/import-answer';
import { measureWords } from './measure-option-words';

const TROUBLES: Record<Exclude<LiveTrouble, null> | 'offline', string> = {
  late: 'The server does not answer; what is shown may be old. It is asked again every few seconds.',
  offline: 'No network; what is shown may be old. The import goes on.',
  signed_out: 'You are signed out; what is shown may be old. Sign in again and reload the page.',
  gone: 'This import is not yours to read any more.',
};

/** Who opened the import, how its files are measured, and whether what is shown is of now. */
export function ImportStanding({ show, summary, trouble }: { show: string; summary: ImportSummary; trouble: LiveTrouble | 'offline' }) {
  const isOver = summary.state === 'done' || summary.state === 'cancelled';
  const facts = [summary.created_by, ...measureWords(summary)];
  return (
    <p className="px-4 pt-2.5 pb-2 text-13 text-ink-3 md:px-6">
      <Link href={`/shows/${encodeURIComponent(show)}/imports`} className="link">
        All imports
      </Link>
      {` · ${facts.join(' · ')}`}
      {trouble !== null ? (
        <span role="alert" className="text-ink">
          {' '}
          · {TROUBLES[trouble]}
        </span>
      ) : isOver || summary.state === 'open' ? null : (
        ` · ${summary.paused ? 'Paused: what is in hand is ended, the rest waits.' : 'This page can be left; the import goes on.'}`
      )}
    </p>
  );
}
