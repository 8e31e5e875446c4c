'use client';

import { Tooltip as Primitive } from 'radix-ui';
import type { ReactElement, ReactNode } from 'react';
import { KeyHint } from './key-hint';

export const TooltipProvider = Primitive.Provider;

/** A word at a control that has no room for it. Never the only place where something is said. */
export function Tooltip({
  label,
  shortcut,
  side,
  children,
}: {
  label: ReactNode;
  shortcut?: string;
  side?: 'top' | 'right' | 'bottom' | 'left';
  children: ReactElement;
}) {
  return (
    <Primitive.Root>
      <Primitive.Trigger asChild>{children}</Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          side={side}
          sideOffset={6}
          collisionPadding={8}
          className="z-50 flex max-w-72 items-center gap-2 rounded border border-rule-strong bg-raised px-2 py-1 text-13 text-ink"
        >
          {label}
          {shortcut === undefined ? null : <KeyHint>{shortcut}</KeyHint>}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
