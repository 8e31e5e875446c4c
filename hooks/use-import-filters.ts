'use client';

import { parseAsString, parseAsStringLiteral, useQueryStates } from 'nuqs';
import { FILE_FILTERS, FILE_SORTS } from '@/lib/rules/import-answer';

const parsers = {
  only: parseAsStringLiteral(FILE_FILTERS).withDefault('all'),
  q: parseAsString.withDefault(''),
  sort: parseAsStringLiteral(FILE_SORTS).withDefault('needs'),
};

/** Filter, search and order of an import's files; in the address, so that a view can be sent to somebody. */
export function useImportFilters() {
  const [filters, setFilters] = useQueryStates(parsers, { history: 'replace', throttleMs: 200 });
  return { filters, setFilters };
}
