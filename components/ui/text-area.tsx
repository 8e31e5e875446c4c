import type { ComponentProps } from 'react';
import { cn } from './cn';
import { controlStyle } from './input';

export function TextArea({ className, rows = 3, ...props }: ComponentProps<'textarea'>) {
  return <textarea rows={rows} className={cn(controlStyle(), 'resize-y py-1.5', className)} {...props} />;
}
