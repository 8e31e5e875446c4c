'use client';

import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useMemo } from 'react';
import type { ActionResult } from '@/lib/rules/action-result';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import { parseShotList, type ShotListError } from '@/lib/rules/parse-shot-list';
import type { ShotPlan } from '@/lib/rules/shot-detail';

/** A list of shots as text, read as it is typed, and what the show would make of it. Errors carry their lines. */
export function useShotPlan(show: string, text: string, plan: (input: PutShotsInput) => Promise<ActionResult<ShotPlan>>) {
  const given = useDeferredValue(text);
  const list = useMemo(() => parseShotList(given), [given]);
  const query = useQuery({
    queryKey: ['shot-plan', show, given],
    enabled: list.shots.length > 0 && list.errors.length === 0,
    staleTime: 0,
    retry: false,
    queryFn: async () => {
      const answer = await plan({ show, items: list.shots.map(({ code, sequence, assets }) => ({ code, sequence, assets })) });
      if (!answer.ok) throw new Error(answer.message);
      return answer.data;
    },
  });
  const ofServer: ShotListError[] = (query.data?.errors ?? []).map(({ index, message }) => ({ line: list.shots[index]?.lines[0] ?? 0, column: 0, message }));
  const errors = list.errors.length > 0 ? list.errors : ofServer;
  return {
    list,
    planned: list.errors.length > 0 || query.data === undefined ? null : query.data.items,
    errors,
    reading: query.isFetching || given !== text,
    failure: query.isError ? query.error.message : null,
  };
}
