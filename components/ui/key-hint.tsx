import type { ReactNode } from 'react';
import { cn } from './cn';

/** A key to press. */
export function KeyHint({ children, className }: { children: ReactNode; className?: string }) {
  return (
    <kbd
      className={cn(
        'inline-flex h-5 min-w-5 items-center justify-center rounded-[3px] border border-rule-strong px-1 font-sans text-12 text-ink-2',
        className,
      )}
    >
      {children}
    </kbd>
  );
}
