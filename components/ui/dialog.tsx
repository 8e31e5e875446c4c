'use client';

import { X } from 'lucide-react';
import { Dialog as Primitive } from 'radix-ui';
import { useRef, type ReactNode } from 'react';
import { cn } from './cn';

interface DialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  description?: ReactNode;
  children: ReactNode;
  className?: string;
  /** Where the focus goes when the dialog opens; the first control otherwise. */
  onOpenAutoFocus?: (event: Event) => void;
}

/** A modal task. On a phone it fills the lower edge of the screen. */
export function Dialog({ open, onOpenChange, title, description, children, className, onOpenAutoFocus }: DialogProps) {
  // Opened by a key or by the page itself, a dialog has no trigger of its own to give the focus back to.
  const before = useRef<Element | null>(null);
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <Primitive.Overlay className="fixed inset-0 z-40 animate-[fade-in_120ms] bg-veil" />
        <Primitive.Content
          onOpenAutoFocus={(event) => {
            before.current = document.activeElement;
            onOpenAutoFocus?.(event);
          }}
          onCloseAutoFocus={(event) => {
            event.preventDefault();
            if (before.current instanceof HTMLElement) before.current.focus();
          }}
          {...(description === undefined ? { 'aria-describedby': undefined } : {})}
          className={cn(
            'fixed inset-x-0 bottom-0 z-50 max-h-[92dvh] overflow-y-auto rounded border border-edge bg-raised p-5 sm:inset-x-auto sm:top-1/2 sm:bottom-auto sm:left-1/2 sm:w-[30rem] sm:-translate-x-1/2 sm:-translate-y-1/2',
            className,
          )}
        >
          <Primitive.Title className="pr-10 text-16 font-medium">{title}</Primitive.Title>
          {description === undefined ? null : (
            <Primitive.Description className="mt-1 text-14 text-ink-2">{description}</Primitive.Description>
          )}
          <div className="mt-4">{children}</div>
          {/* Last in the order of keys, so that a dialog begins at its first control. */}
          <Primitive.Close
            aria-label="Close"
            className="absolute top-4 right-4 inline-flex size-8 items-center justify-center rounded text-ink-2 hover:text-ink pointer-coarse:size-11"
          >
            <X aria-hidden className="size-4" />
          </Primitive.Close>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
