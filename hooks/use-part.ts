'use client';

import { useQuery } from '@tanstack/react-query';
import type { PartDetail } from '@/lib/rules/part-detail';
import { requestJson } from './request-json';

/** A part with its versions and all that was set on it; starts with what the server wrote into the page. */
export function usePart(show: string, initial: PartDetail) {
  const { asset, part } = initial.row;
  return useQuery({
    queryKey: ['part', show, asset, part],
    queryFn: ({ signal }) =>
      requestJson<PartDetail>(
        `/api/v1/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(asset)}/parts/${encodeURIComponent(part ?? '')}`,
        { signal },
      ),
    initialData: initial,
  });
}
