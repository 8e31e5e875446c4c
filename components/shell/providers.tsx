'use client';

import { QueryClientProvider } from '@tanstack/react-query';
import { NuqsAdapter } from 'nuqs/adapters/next/app';
import { useState, type ReactNode } from 'react';
import { Toaster } from '@/components/ui/toaster';
import { TooltipProvider } from '@/components/ui/tooltip';
import { makeQueryClient } from '@/hooks/make-query-client';

/** What every page's client side stands on: data cache, filters in the URL, tooltips and toasts. */
export function Providers({ children }: { children: ReactNode }) {
  const [client] = useState(makeQueryClient);
  return (
    <QueryClientProvider client={client}>
      <NuqsAdapter>
        <TooltipProvider delayDuration={400}>{children}</TooltipProvider>
      </NuqsAdapter>
      <Toaster />
    </QueryClientProvider>
  );
}
