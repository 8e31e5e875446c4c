'use client';

import { keepPreviousData, useInfiniteQuery, useQueryClient, type InfiniteData } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo, useRef } from 'react';
import type { FileFilter, FileSort, ImportFileAnswer, ImportFilePage, ImportFileRow } from '@/lib/rules/import-answer';
import { requestJson } from './request-json';

const PAGE_ROWS = 100;
/** While an import goes on, counts and findings of what is shown are read anew at most this often. */
const REFRESH_MS = 4_000;

export interface FileQuery {
  only: FileFilter;
  q: string;
  sort: FileSort;
}

type FilesData = InfiniteData<ImportFilePage, string | null>;

/** The files of an import that a filter and a search let through, read page by page as they come into sight. */
export function useImportFiles(show: string, id: string, query: FileQuery, first: { query: FileQuery; page: ImportFilePage }) {
  const client = useQueryClient();
  const ofImport = useMemo(() => ['import-files', show, id] as const, [show, id]);
  const { only, q, sort } = query;
  const isFirst = first.query.only === only && first.query.q === q && first.query.sort === sort;
  const files = useInfiniteQuery({
    queryKey: [...ofImport, only, q, sort],
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) => {
      const search = new URLSearchParams({ only, sort, limit: String(PAGE_ROWS), ...(q === '' ? {} : { q }), ...(pageParam === null ? {} : { cursor: pageParam }) });
      return requestJson<ImportFilePage>(`/api/v1/shows/${encodeURIComponent(show)}/imports/${id}/files?${search}`, { signal });
    },
    getNextPageParam: (page) => page.next_cursor,
    placeholderData: keepPreviousData,
    initialData: isFirst ? { pages: [first.page], pageParams: [null] } : undefined,
  });
  const timer = useRef<ReturnType<typeof setTimeout> | null>(null);
  useEffect(
    () => () => {
      if (timer.current !== null) clearTimeout(timer.current);
    },
    [],
  );
  const refresh = useCallback(() => client.invalidateQueries({ queryKey: ofImport }), [client, ofImport]);
  /** Puts what changed into the rows that are shown, at once; their findings and the counts follow. */
  const take = useCallback(
    (changed: readonly ImportFileAnswer[]) => {
      const byName = new Map(changed.map((file) => [file.name, file]));
      client.setQueriesData<FilesData>({ queryKey: ofImport }, (data) => data && { ...data, pages: data.pages.map((page) => ({ ...page, items: page.items.map((row) => (byName.has(row.name) ? { ...row, ...byName.get(row.name) } : row)) })) });
      timer.current ??= setTimeout(() => {
        timer.current = null;
        void refresh();
      }, REFRESH_MS);
    },
    [client, ofImport, refresh],
  );
  const pages = files.data?.pages;
  // A file whose place changed between two readings may stand on both pages.
  const rows = useMemo((): ImportFileRow[] => [...new Map((pages ?? []).flatMap((page) => page.items.map((row) => [row.name, row] as const))).values()], [pages]);
  const last = pages?.at(-1) ?? first.page;
  return { ...files, rows, counts: last.counts, found: last.found, take, refresh };
}
