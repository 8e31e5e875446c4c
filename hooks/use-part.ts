'use client';

import { queryOptions, useQuery } from '@tanstack/react-query';
import type { PartDetail } from '@/lib/rules/part-detail';
import { requestJson } from './request-json';

function partQuery(show: string, asset: string, part: string) {
  return queryOptions({
    queryKey: ['part', show, asset, part],
    queryFn: ({ signal }) =>
      requestJson<PartDetail>(
        `/api/v1/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(asset)}/parts/${encodeURIComponent(part)}`,
        { signal },
      ),
  });
}

/** A part with its versions and all that was set on it; starts with what the server wrote into the page. */
export function usePart(show: string, initial: PartDetail) {
  const { asset, part } = initial.row;
  return useQuery({ ...partQuery(show, asset, part ?? ''), initialData: initial });
}

/** A part by its name, read when it is asked for; always anew, since its revision goes into what is set. */
export function useNamedPart(show: string, asset: string, part: string) {
  return useQuery({ ...partQuery(show, asset, part), staleTime: 0 });
}
