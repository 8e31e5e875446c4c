import { cn } from '@/components/ui/cn';
import type { ImportAnswer, ImportCounts } from '@/lib/rules/import-answer';
import { timeLeftWords } from '@/lib/rules/time-left';
import { importStateWords } from './import-state-words';

type Stage = 'total' | 'queued' | 'reading' | 'measuring' | 'done' | 'failed';

const STAGES: { stage: Stage; word: string; fill: string }[] = [
  { stage: 'total', word: 'Uploaded', fill: 'bg-ink-3' },
  { stage: 'queued', word: 'Waiting', fill: 'bg-ink-3' },
  { stage: 'reading', word: 'Reading', fill: 'bg-brass' },
  { stage: 'measuring', word: 'Measuring', fill: 'bg-brass' },
  { stage: 'done', word: 'Done', fill: 'bg-ink-2' },
  { stage: 'failed', word: 'Failed', fill: 'bg-wrong' },
];

/** How far an import is: its state in words, the time left where that is known, and a bar for each stage, all to one scale. */
export function ImportProgress({ summary }: { summary: ImportAnswer }) {
  const { counts } = summary;
  const ended = counts.done + counts.failed;
  const words = [importStateWords(summary), ...(summary.seconds_left && !summary.paused ? [timeLeftWords(summary.seconds_left)] : [])];
  return (
    <div className="border-b border-rule px-4 pt-3 pb-3.5 md:px-6">
      <div className="flex items-baseline justify-between gap-4 text-13">
        <p className="text-ink-2">
          <span className="font-mono text-ink">{ended.toLocaleString('en')}</span> of <span className="font-mono text-ink">{counts.total.toLocaleString('en')}</span> ended
        </p>
        <p className="text-right text-ink-2 first-letter:uppercase">{words.join(', ')}</p>
      </div>
      <div role="progressbar" aria-label="Files that have ended" aria-valuemin={0} aria-valuemax={counts.total} aria-valuenow={ended} aria-valuetext={`${ended} of ${counts.total}, ${words.join(', ')}`} className="sr-only" />
      <dl className="mt-3 grid grid-cols-3 gap-x-4 gap-y-3 sm:grid-cols-6 md:gap-x-6">
        {STAGES.map(({ stage, word, fill }) => (
          <div key={stage} className="min-w-0">
            <div className="flex items-baseline justify-between gap-2">
              <dt className="truncate text-12 text-ink-3">{word}</dt>
              <dd className={cn('font-mono text-13', stage === 'failed' && counts.failed > 0 ? 'text-wrong' : counts[stage] === 0 ? 'text-ink-3' : 'text-ink')}>{counts[stage].toLocaleString('en')}</dd>
            </div>
            <div aria-hidden className="mt-1.5 h-1 bg-rule">
              <div className={cn('h-full min-w-0 transition-[width] duration-300 motion-reduce:transition-none', fill)} style={{ width: shareOf(counts, stage) }} />
            </div>
          </div>
        ))}
      </dl>
    </div>
  );
}

/** Of the files of the import; one file among thousands is still a sliver that can be seen. */
function shareOf(counts: ImportCounts, stage: Stage): string {
  if (counts.total === 0 || counts[stage] === 0) return '0';
  return `max(2px, ${(100 * counts[stage]) / counts.total}%)`;
}
