import { cn } from '@/components/ui/cn';

/** The mark: a weigh-house's single beam on its fulcrum, a ring hanging from the long arm. */
export function Mark({ className }: { className?: string }) {
  return (
    <svg viewBox="0 0 28 20" aria-hidden fill="none" className={cn('h-5 w-7 shrink-0', className)}>
      <path d="M2 4.5H26M2 2V7M26 2V7" stroke="var(--ink)" strokeWidth="1.75" />
      <path d="M22 4.5V10" stroke="var(--ink)" strokeWidth="1.5" />
      <circle cx="22" cy="13" r="3" stroke="var(--ink)" strokeWidth="1.75" />
      <path d="M9.5 5.6 14 18H5Z" fill="var(--brass)" />
    </svg>
  );
}
