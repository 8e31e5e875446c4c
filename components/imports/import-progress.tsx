import type { ImportCounts } from '@/lib/rules/import-answer';
import type { ImportState } from '@/lib/rules/states';

export const IMPORT_STATE_WORDS: Record<ImportState, string> = {
  open: 'not submitted',
  queued: 'waiting',
  running: 'being measured',
  done: 'done',
  cancelled: 'cancelled',
};

/** A rule as long as the import, filled by what has ended; failures at its far end. */
export function ImportProgress({ counts, state }: { counts: ImportCounts; state: ImportState }) {
  const ended = counts.done + counts.failed;
  const share = (count: number) => `${counts.total === 0 ? 0 : (100 * count) / counts.total}%`;
  const words = [
    `${ended.toLocaleString('en')} of ${counts.total.toLocaleString('en')}`,
    IMPORT_STATE_WORDS[state],
    counts.failed > 0 ? `${counts.failed.toLocaleString('en')} failed` : null,
  ].filter((word) => word !== null);
  return (
    <div className="min-w-0">
      <div role="progressbar" aria-label="Files that have ended" aria-valuemin={0} aria-valuemax={counts.total} aria-valuenow={ended} className="flex h-2 bg-rule">
        <div className="bg-ink-3" style={{ width: share(counts.done) }} />
        <div className="bg-brass" style={{ width: share(counts.reading + counts.measuring) }} />
        <div className="ml-auto bg-wrong" style={{ width: share(counts.failed) }} />
      </div>
      <p className="mt-1.5 text-13 text-ink-2">{words.join(' · ')}</p>
    </div>
  );
}
