'use client';

import { useInfiniteQuery, type InfiniteData } from '@tanstack/react-query';
import { useMemo } from 'react';
import {
  queueKey,
  type QueueCounts,
  type QueueFilter,
  type QueuePage,
  type QueueRow,
} from '@/lib/rules/approval-queue';
import { requestJson } from './request-json';

const PAGE_ROWS = 200;

export type QueueData = InfiniteData<QueuePage, string | null>;

export const queuesKey = (show: string) => ['queue', show] as const;

/** The values that a filter lets through, read page by page as they come into sight. */
export function useQueue(show: string, state: QueueFilter) {
  const query = useInfiniteQuery({
    queryKey: [...queuesKey(show), state],
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) => {
      const search = new URLSearchParams({
        state,
        limit: String(PAGE_ROWS),
        ...(pageParam === null ? {} : { cursor: pageParam }),
      });
      return requestJson<QueuePage>(`/api/v1/shows/${encodeURIComponent(show)}/approvals?${search}`, { signal });
    },
    getNextPageParam: (page) => page.next_cursor,
    refetchOnWindowFocus: true,
  });
  const { data } = query;
  // A value whose place changed between two readings may stand on both pages.
  const rows = useMemo(
    (): QueueRow[] => [
      ...new Map(
        (data?.pages ?? []).flatMap((page) => page.items.map((row) => [queueKey(row), row] as const)),
      ).values(),
    ],
    [data],
  );
  const counts: QueueCounts | null = data?.pages[0]?.counts ?? null;
  return { ...query, rows, counts };
}
