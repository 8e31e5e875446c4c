import { useId, type ReactNode } from 'react';
import { cn } from '@/components/ui/cn';

/** A titled part of a page of forms. */
export function Section({ title, className, children }: { title: string; className?: string; children: ReactNode }) {
  const id = useId();
  return (
    <section aria-labelledby={id} className={cn('flex min-w-0 flex-col gap-4', className)}>
      <h2 id={id}>{title}</h2>
      {children}
    </section>
  );
}
