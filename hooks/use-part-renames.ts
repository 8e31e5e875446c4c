'use client';

import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useRouter } from 'next/navigation';
import type { DecidePartRenamesInput } from '@/lib/rules/inputs/part-renames';
import type { AssetRenames } from '@/lib/rules/part-rename';
import { requestJson } from './request-json';

export type RenameItem = DecidePartRenamesInput['items'][number];

/** Whose renames: an asset's, or those of the assets that an import brought. */
export type RenameScope = { asset: string } | { import: string };

/** Parts that current versions lack beside those that they brought, and the decisions about them. Not asked for while `waiting`. */
export function usePartRenames(show: string, scope: RenameScope, waiting: boolean) {
  const router = useRouter();
  const queries = useQueryClient();
  const address = `/api/v1/shows/${encodeURIComponent(show)}/part-renames`;
  const key = ['part-renames', show, scope];
  const { data } = useQuery({
    queryKey: key,
    queryFn: () => requestJson<{ items: AssetRenames[] }>(`${address}?${new URLSearchParams(scope as Record<string, string>)}`),
    enabled: !waiting,
  });
  const decision = useMutation({
    mutationFn: (items: readonly RenameItem[]) => requestJson<unknown>(address, { method: 'POST', body: { items } }),
    // After a refusal too: somebody else may have decided meanwhile.
    onSettled: async () => {
      await queries.invalidateQueries();
      router.refresh();
    },
  });
  return {
    items: data?.items ?? [],
    busy: decision.isPending,
    refusal: decision.error === null ? null : decision.error.message,
    decide: (items: readonly RenameItem[]) => decision.mutate(items),
  };
}
