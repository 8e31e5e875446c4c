'use client';

import { parseAsArrayOf, parseAsBoolean, parseAsString, parseAsStringLiteral, useQueryStates } from 'nuqs';
import { CATEGORIES, VALUE_STATES } from '@/lib/rules/states';

export const PART_COLUMNS = [
  'name',
  'version',
  'construction',
  'source',
  'mass',
  'beam',
  'x',
  'y',
  'z',
  'i1',
  'i2',
  'i3',
  'volume',
  'problems',
  'locks',
  'state',
] as const;
export type PartColumn = (typeof PART_COLUMNS)[number];

const parsers = {
  q: parseAsString.withDefault(''),
  state: parseAsArrayOf(parseAsStringLiteral([...VALUE_STATES, 'locked'] as const)).withDefault([]),
  category: parseAsStringLiteral(CATEGORIES),
  sort: parseAsStringLiteral(PART_COLUMNS),
  down: parseAsBoolean.withDefault(false),
  flat: parseAsBoolean.withDefault(false),
  /** Columns asked for; none: those that fit. */
  columns: parseAsArrayOf(parseAsStringLiteral(PART_COLUMNS)),
};

/** Filters, order, grouping and columns of the parts table; they live in the address, so a link shows what its sender saw. */
export function usePartFilters() {
  return useQueryStates(parsers, { history: 'replace', throttleMs: 150 });
}
