import { cn } from './cn';

/** A place held for what is still being read. It does not move: a pulsing page beside colour-critical screens disturbs. */
export function Skeleton({ className }: { className?: string }) {
  return <span aria-hidden className={cn('block h-2 rounded-[2px] bg-rule', className)} />;
}
