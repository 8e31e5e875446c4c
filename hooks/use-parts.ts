'use client';

import { useInfiniteQuery, type InfiniteData } from '@tanstack/react-query';
import { useEffect, useMemo } from 'react';
import type { AssetTotal, PartCounts, PartPage, PartRow } from '@/lib/rules/part-row';
import { requestJson } from './request-json';

/** Rows asked for at once: the first page is on screen soon, the rest follows by itself. */
const PAGE_ROWS = 1000;

export type PartsData = InfiniteData<PartPage, string | null>;

export const partsKey = (show: string) => ['parts', show] as const;

export function partsPath(show: string, query: Record<string, string> = {}): string {
  const search = new URLSearchParams(query).toString();
  return `/api/v1/shows/${encodeURIComponent(show)}/parts${search === '' ? '' : `?${search}`}`;
}

/** All rows of a show, read page by page until none is left, so that the table sorts and filters without asking again. */
export function useParts(show: string) {
  const query = useInfiniteQuery({
    queryKey: partsKey(show),
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) =>
      requestJson<PartPage>(
        partsPath(show, { limit: String(PAGE_ROWS), ...(pageParam === null ? {} : { cursor: pageParam }) }),
        { signal },
      ),
    getNextPageParam: (page) => page.next_cursor,
  });
  const { hasNextPage, isFetching, isError, fetchNextPage, data } = query;

  useEffect(() => {
    if (hasNextPage && !isFetching && !isError) void fetchNextPage();
  }, [hasNextPage, isFetching, isError, fetchNextPage]);

  const rows = useMemo((): PartRow[] => data?.pages.flatMap((page) => page.items) ?? [], [data]);
  const totals = useMemo((): AssetTotal[] => lastOfEach(data?.pages.flatMap((page) => page.assets) ?? []), [data]);
  const counts: PartCounts | null = data?.pages[0]?.counts ?? null;
  const complete = data !== undefined && !hasNextPage;
  // Pages read one after another may lie at different revisions: what changed since the oldest is asked for again.
  const revision = complete ? Math.min(...data.pages.map((page) => page.revision)) : null;
  return { ...query, rows, totals, counts, complete, revision };
}

/** An asset that lies on two pages is told on both; the later telling wins. */
function lastOfEach(totals: readonly AssetTotal[]): AssetTotal[] {
  return [...new Map(totals.map((total) => [total.asset, total])).values()];
}
