import type { ReactNode } from 'react';
import { cn } from './cn';

interface EmptyStateProps {
  title: string;
  children?: ReactNode;
  /** What to do next. */
  action?: ReactNode;
  drawing?: ReactNode;
  className?: string;
}

/** Says why nothing is here and what to do next. */
export function EmptyState({ title, children, action, drawing, className }: EmptyStateProps) {
  return (
    <div className={cn('mx-auto flex max-w-md flex-col items-start gap-3 px-6 py-16', className)}>
      {drawing}
      <h2>{title}</h2>
      {children === undefined ? null : <div className="text-14 text-ink-2">{children}</div>}
      {action === undefined ? null : <div className="mt-1 flex flex-wrap gap-2">{action}</div>}
    </div>
  );
}
