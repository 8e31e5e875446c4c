'use client';

import type { ComponentProps, ReactNode } from 'react';
import { CopyFull } from '@/components/ui/copy-full';
import { TopBar } from './top-bar';

type AppShellProps = ComponentProps<typeof TopBar> & { children: ReactNode };

/** Bar and page. The page gets the height that is left, so that a table can scroll inside it. */
export function AppShell({ children, ...bar }: AppShellProps) {
  return (
    <div className="flex h-dvh flex-col">
      <a
        href="#page"
        className="sr-only focus-visible:not-sr-only focus-visible:absolute focus-visible:top-2 focus-visible:left-2 focus-visible:z-50 focus-visible:rounded focus-visible:bg-raised focus-visible:px-3 focus-visible:py-2"
      >
        To the page
      </a>
      <TopBar {...bar} />
      <main id="page" tabIndex={-1} className="flex min-h-0 flex-1 flex-col overflow-auto outline-none">
        <CopyFull className="contents">{children}</CopyFull>
      </main>
    </div>
  );
}
