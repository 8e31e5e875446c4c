'use client';

import { Toaster as Sonner } from 'sonner';

const classNames = {
  toast: 'flex w-full items-center gap-3 rounded border border-edge bg-raised px-4 py-3 font-sans text-14 text-ink',
  title: 'font-medium',
  description: 'text-13 text-ink-2',
  actionButton:
    'ml-auto h-7 shrink-0 rounded border border-edge px-2.5 text-13 font-medium text-ink hover:border-ink-2',
  cancelButton: 'ml-auto h-7 shrink-0 rounded px-2.5 text-13 text-ink-2 hover:text-ink',
  error: 'border-wrong!',
  icon: 'hidden',
};

/** Where short words about what has just happened appear. One for the whole page. */
export function Toaster() {
  return (
    <Sonner
      position="bottom-center"
      offset={48}
      visibleToasts={3}
      toastOptions={{ unstyled: true, classNames, duration: 8000 }}
    />
  );
}
