'use client';

import { parseAsString, parseAsStringLiteral, useQueryStates } from 'nuqs';
import { useTransition } from 'react';
import { SHOT_FILTERS } from '@/lib/rules/inputs/list-shots';

const parsers = {
  q: parseAsString.withDefault(''),
  asset: parseAsString.withDefault(''),
  state: parseAsStringLiteral(SHOT_FILTERS),
  /** Another filter begins at the first page again. */
  cursor: parseAsString,
};

/** Filters of the list of shots; in the address, and the server reads the list anew for each. */
export function useShotFilters() {
  const [reading, startTransition] = useTransition();
  const [filters, setFilters] = useQueryStates(parsers, { history: 'replace', shallow: false, throttleMs: 300, startTransition });
  return { filters, setFilters, reading };
}
