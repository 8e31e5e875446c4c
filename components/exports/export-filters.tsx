'use client';

import { Chip } from '@/components/ui/chip';
import { Input } from '@/components/ui/input';
import { useExportFilters } from '@/hooks/use-export-filters';
import { CATEGORIES, CATEGORY_WORDS, STATE_WORDS, type Category, type ValueState } from '@/lib/rules/states';

/** What can be in an export: what is left out never is. */
const EXPORTED: readonly ValueState[] = ['measured', 'approved', 'outdated', 'unset', 'blocked'];

function toggled<Word>(list: readonly Word[], word: Word): Word[] | null {
  const next = list.includes(word) ? list.filter((one) => one !== word) : [...list, word];
  return next.length === 0 ? null : next;
}

const capital = (word: string): string => word[0].toUpperCase() + word.slice(1);

/** Which rows go into the file. */
export function ExportFilters() {
  const { filters, setFilters, reading } = useExportFilters();
  const { asset, state, category } = filters;
  return (
    <div role="search" aria-label="Rows to export" aria-busy={reading} className="flex flex-wrap items-center gap-2 border-b border-rule bg-bench px-4 py-1.5 md:px-6">
      <Input
        type="search"
        aria-label="One asset only, by its code"
        placeholder="Asset code"
        value={asset}
        onChange={(event) => void setFilters({ asset: event.target.value || null })}
        className="w-full md:w-60"
      />
      {EXPORTED.map((one: ValueState) => (
        <Chip key={one} pressed={state.includes(one)} onClick={() => void setFilters({ state: toggled(state, one) })}>
          {capital(STATE_WORDS[one])}
        </Chip>
      ))}
      {CATEGORIES.map((one: Category) => (
        <Chip key={one} pressed={category.includes(one)} onClick={() => void setFilters({ category: toggled(category, one) })}>
          {capital(CATEGORY_WORDS[one])}
        </Chip>
      ))}
    </div>
  );
}
