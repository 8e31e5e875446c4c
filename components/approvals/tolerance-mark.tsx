import type { ReactNode } from 'react';
import { cn } from '@/components/ui/cn';

/** Whether a change stays within the show's tolerance, by shape and word: a stroke that crosses its limit, or ends before it. */
export function ToleranceMark({
  beyond,
  children,
  className,
}: {
  beyond: boolean;
  children?: ReactNode;
  className?: string;
}) {
  return (
    <span
      className={cn(
        'inline-flex items-center gap-1.5 text-13 whitespace-nowrap',
        beyond ? 'text-ink' : 'text-ink-3',
        className,
      )}
    >
      <svg
        viewBox="0 0 16 12"
        width="16"
        height="12"
        aria-hidden
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        className="shrink-0"
      >
        <path d="M9.5 1V11" />
        {beyond ? <path d="M1 6H14M11.5 3.5 14.5 6 11.5 8.5" strokeLinejoin="round" /> : <path d="M1 6H6" />}
      </svg>
      {children ?? (beyond ? 'beyond tolerance' : 'within tolerance')}
    </span>
  );
}
