import { cn } from '@/components/ui/cn';
import { STATE_WORDS, type RowState } from '@/lib/rules/states';

const INK: Record<RowState, string> = {
  approved: 'text-verdigris',
  locked: 'text-pewter',
  measured: 'text-ink-2',
  outdated: 'text-ink',
  unset: 'text-ink-3',
  blocked: 'text-wrong',
  left_out: 'text-ink-3',
};

/** The state's own shape, 14 × 14, in the current colour: it is told apart without colour. */
export function StateShape({ state, className }: { state: RowState; className?: string }) {
  return (
    <svg
      viewBox="0 0 14 14"
      width="14"
      height="14"
      aria-hidden
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      className={cn('shrink-0', className)}
    >
      {drawing(state)}
    </svg>
  );
}

function drawing(state: RowState) {
  switch (state) {
    case 'measured':
      return <circle cx="7" cy="7" r="4.5" />;
    case 'approved':
      return <path d="M2.5 7.4 5.6 10.5 11.5 3.8" strokeWidth="2" />;
    case 'locked':
      return (
        <g fill="currentColor" stroke="none">
          <circle cx="7" cy="5" r="4" />
          <path d="M4.4 8.2 3.6 13.4 7 11.6 10.4 13.4 9.6 8.2Z" />
        </g>
      );
    case 'outdated':
      return <path d="M7 2.2 12.4 11.6H1.6Z" strokeLinejoin="round" />;
    case 'blocked':
      return <path d="M3 3 11 11M11 3 3 11" strokeWidth="2" />;
    case 'unset':
      return <circle cx="7" cy="7" r="4.75" strokeDasharray="2.1 2.875" strokeDashoffset="1" />;
    case 'left_out':
      return (
        <g>
          <circle cx="7" cy="7" r="4.5" />
          <path d="M3.8 10.2 10.2 3.8" />
        </g>
      );
  }
}

/** Shape and word of a state. */
export function StateMark({ state, className }: { state: RowState; className?: string }) {
  return (
    <span className={cn('inline-flex items-center gap-1.5 align-middle text-13 whitespace-nowrap', INK[state], className)}>
      <StateShape state={state} />
      {STATE_WORDS[state]}
    </span>
  );
}
