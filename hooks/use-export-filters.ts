'use client';

import { parseAsArrayOf, parseAsString, parseAsStringLiteral, useQueryStates } from 'nuqs';
import { useTransition } from 'react';
import { CATEGORIES, VALUE_STATES } from '@/lib/rules/states';

const parsers = {
  asset: parseAsString.withDefault(''),
  category: parseAsArrayOf(parseAsStringLiteral(CATEGORIES)).withDefault([]),
  state: parseAsArrayOf(parseAsStringLiteral(VALUE_STATES)).withDefault([]),
};

/** Filters of the export page; in the address, and the server reads the first rows anew for each. */
export function useExportFilters() {
  const [reading, startTransition] = useTransition();
  const [filters, setFilters] = useQueryStates(parsers, { history: 'replace', shallow: false, throttleMs: 300, startTransition });
  return { filters, setFilters, reading };
}
