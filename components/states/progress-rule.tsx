import { cn } from '@/components/ui/cn';
import { STATE_WORDS, VALUE_STATES, type RowState } from '@/lib/rules/states';

const ORDER: readonly RowState[] = ['locked', ...VALUE_STATES.filter((state) => state !== 'left_out')];
const PARTS_PER_TICK = 6;
const MOST_TICKS = 150;

const FILL: Record<RowState, string> = {
  locked: 'bg-pewter',
  approved: 'bg-verdigris',
  measured: 'bg-ink-3',
  outdated: 'bg-ink',
  unset: 'border border-dotted border-edge',
  blocked: 'bg-wrong',
  left_out: 'border border-edge',
};

/** Parts between two ticks: six, or the first six times a power of ten that leaves room between them. */
function partsPerTick(total: number): number {
  let step = PARTS_PER_TICK;
  while (total / step > MOST_TICKS) step *= 10;
  return step;
}

function ticks(total: number): string {
  const step = partsPerTick(total);
  let path = '';
  for (let index = 0; index * step <= total; index++) path += `M${index * step} 0V${index % 10 === 0 ? 8 : 4}`;
  return path;
}

/** How far a show is: a graduated rule, its length the parts that count, coloured by state, with the counts below. */
export function ProgressRule({ counts, className }: { counts: Partial<Record<RowState, number>>; className?: string }) {
  const present = ORDER.filter((state) => (counts[state] ?? 0) > 0);
  const total = present.reduce((sum, state) => sum + (counts[state] ?? 0), 0);
  const leftOut = counts.left_out ?? 0;
  if (total + leftOut === 0) return null;
  return (
    <div className={cn('min-w-0', className)}>
      <div aria-hidden className="flex h-2 gap-px">
        {present.map((state) => (
          <span
            key={state}
            className={cn('min-w-1 forced-colors:border forced-colors:border-[CanvasText]', FILL[state])}
            style={{ flexGrow: counts[state], flexBasis: 0 }}
          />
        ))}
      </div>
      <svg
        aria-hidden
        viewBox={`0 0 ${Math.max(total, 1)} 8`}
        preserveAspectRatio="none"
        className="block h-1.5 w-full overflow-visible text-edge"
      >
        <path d={ticks(total)} stroke="currentColor" vectorEffect="non-scaling-stroke" fill="none" />
      </svg>
      <ul aria-label="Parts by state" className="mt-1 flex flex-wrap gap-x-4 gap-y-0.5 text-12 text-ink-2">
        {[...present, ...(leftOut > 0 ? (['left_out'] as const) : [])].map((state) => (
          <li key={state} className="flex items-center gap-1.5">
            <span aria-hidden className={cn('size-2', FILL[state])} />
            {(counts[state] ?? 0).toLocaleString('en')} {STATE_WORDS[state]}
          </li>
        ))}
      </ul>
    </div>
  );
}
