'use client';

import { Popover as Primitive } from 'radix-ui';
import type { ReactElement, ReactNode } from 'react';
import { cn } from './cn';

interface PopoverProps {
  trigger: ReactElement;
  /** Accessible name of the panel. */
  label: string;
  open?: boolean;
  onOpenChange?: (open: boolean) => void;
  align?: 'start' | 'center' | 'end';
  className?: string;
  children: ReactNode;
}

/** A small panel at its trigger that leaves the page in reach. */
export function Popover({ trigger, label, open, onOpenChange, align = 'start', className, children }: PopoverProps) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Trigger asChild>{trigger}</Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          aria-label={label}
          align={align}
          sideOffset={6}
          collisionPadding={8}
          className={cn(
            'z-40 max-h-(--radix-popover-content-available-height) w-80 overflow-y-auto rounded border border-edge bg-raised p-4',
            className,
          )}
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
