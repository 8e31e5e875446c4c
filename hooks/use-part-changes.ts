'use client';

import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { mergeParts } from '@/lib/rules/merge-parts';
import { partKey } from '@/lib/rules/part-key';
import type { PartPage } from '@/lib/rules/part-row';
import { requestJson } from './request-json';
import { partsKey, partsPath, type PartsData } from './use-parts';

const EVERY_MS = 15_000;

/** Brings in what others change while the table is open: small answers since the revision held, all anew when rows come or go. */
export function usePartChanges(show: string, revision: number | null): void {
  const client = useQueryClient();
  const { data } = useQuery({
    queryKey: ['part-changes', show, revision],
    queryFn: ({ signal }) =>
      requestJson<PartPage>(partsPath(show, { changed_since: String(revision), limit: '1000' }), { signal }),
    enabled: revision !== null,
    refetchInterval: EVERY_MS,
    staleTime: EVERY_MS,
    gcTime: 0,
  });

  useEffect(() => {
    if (data === undefined || revision === null || data.revision === revision) return;
    const held = client.getQueryData<PartsData>(partsKey(show));
    if (held === undefined) return;
    const keys = new Set(held.pages.flatMap((page) => page.items.map(partKey)));
    const known = data.items.every((row) => keys.has(partKey(row))) && data.counts?.total === keys.size;
    if (!known || data.next_cursor !== null) {
      void client.invalidateQueries({ queryKey: partsKey(show) });
      return;
    }
    client.setQueryData<PartsData>(partsKey(show), { ...held, pages: mergeParts(held.pages, data) });
  }, [client, data, revision, show]);
}
