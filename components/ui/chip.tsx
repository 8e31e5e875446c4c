import type { ComponentProps, ReactNode } from 'react';
import { cn } from './cn';

type ChipProps = ComponentProps<'button'> & { pressed: boolean; count?: number; children: ReactNode };

/** A filter that is on or off, with how many rows it would show. */
export function Chip({ pressed, count, className, children, ...props }: ChipProps) {
  return (
    <button
      type="button"
      aria-pressed={pressed}
      className={cn(
        'inline-flex h-7 shrink-0 items-center gap-1.5 rounded-full border px-3 text-13 whitespace-nowrap transition-colors duration-100 pointer-coarse:h-11',
        pressed ? 'border-brass text-ink' : 'border-rule-strong text-ink-2 hover:border-edge hover:text-ink',
        className,
      )}
      {...props}
    >
      {children}
      {count === undefined ? null : (
        <span className={pressed ? 'text-ink-2' : 'text-ink-3'}>{count.toLocaleString('en')}</span>
      )}
    </button>
  );
}
