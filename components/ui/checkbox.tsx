'use client';

import { Check, Minus } from 'lucide-react';
import { Checkbox as Primitive } from 'radix-ui';
import type { ComponentProps } from 'react';
import { cn } from './cn';

/** Yes, no or, for a group, some of them. The label stands beside it in the caller's markup. */
export function Checkbox({ className, ...props }: ComponentProps<typeof Primitive.Root>) {
  return (
    <Primitive.Root
      className={cn(
        'group inline-flex size-4 shrink-0 align-middle items-center justify-center rounded-[3px] border border-edge bg-ground text-on-brass hover:border-ink-2 disabled:opacity-50 data-[state=checked]:border-brass data-[state=checked]:bg-brass data-[state=indeterminate]:border-brass data-[state=indeterminate]:bg-brass',
        className,
      )}
      {...props}
    >
      <Primitive.Indicator>
        <Check aria-hidden className="hidden size-3 stroke-3 group-data-[state=checked]:block" />
        <Minus aria-hidden className="hidden size-3 stroke-3 group-data-[state=indeterminate]:block" />
      </Primitive.Indicator>
    </Primitive.Root>
  );
}
