import { cva } from 'class-variance-authority';
import type { ComponentProps } from 'react';
import { cn } from './cn';

export const controlStyle = cva(
  'w-full rounded border border-edge bg-ground px-2.5 text-14 text-ink hover:border-ink-2 focus-visible:border-brass focus-visible:outline-1 focus-visible:outline-offset-0 disabled:cursor-not-allowed disabled:opacity-50 aria-invalid:border-wrong',
);

/** One line of text. Inside a Field it takes id, hint and error from there. */
export function Input({ className, ...props }: ComponentProps<'input'>) {
  return <input className={cn(controlStyle(), 'h-8 pointer-coarse:h-11', className)} {...props} />;
}
