'use client';

import { useQuery } from '@tanstack/react-query';
import type { MaterialPage, MaterialRow } from '@/lib/rules/material-row';
import { requestJson } from './request-json';

const NONE: readonly MaterialRow[] = [];
const MOST = 1000;

/** The materials that a show may use, read once and kept for the session. */
export function useMaterials(show: string): readonly MaterialRow[] {
  const { data } = useQuery({
    queryKey: ['materials', show],
    queryFn: ({ signal }) =>
      requestJson<MaterialPage>(`/api/v1/shows/${encodeURIComponent(show)}/materials?limit=${MOST}`, { signal }),
    staleTime: 300_000,
  });
  return data?.items ?? NONE;
}
