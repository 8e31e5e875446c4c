'use client';

import { ListTree, PanelRight } from 'lucide-react';
import type { RefObject } from 'react';
import { Chip } from '@/components/ui/chip';
import { IconButton } from '@/components/ui/icon-button';
import { Input } from '@/components/ui/input';
import type { usePartFilters } from '@/hooks/use-part-filters';
import type { PartCounts } from '@/lib/rules/part-row';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CATEGORIES, STATE_WORDS, type Category, type RowState } from '@/lib/rules/states';
import { ColumnsMenu } from './columns-menu';

/** What needs somebody first. */
const CHIP_STATES: readonly RowState[] = ['unset', 'blocked', 'outdated', 'measured', 'approved', 'left_out'];

const CATEGORY_PLURALS: Record<Category, string> = {
  creature: 'Creatures',
  prop: 'Props',
  costume: 'Costumes',
  set: 'Set pieces',
  vehicle: 'Vehicles',
  other: 'Other',
};

interface PartsToolbarProps {
  counts: PartCounts | null;
  frame: ShowFrame;
  filters: ReturnType<typeof usePartFilters>;
  searchRef: RefObject<HTMLInputElement | null>;
  inspectorOpen: boolean;
  onInspector: () => void;
}

function capital(word: string): string {
  return word[0].toUpperCase() + word.slice(1);
}

/** Find and filter; every choice goes into the address. */
export function PartsToolbar({
  counts,
  frame,
  filters: [filters, setFilters],
  searchRef,
  inspectorOpen,
  onInspector,
}: PartsToolbarProps) {
  const toggleState = (state: RowState) => {
    const next = filters.state.includes(state)
      ? filters.state.filter((one) => one !== state)
      : [...filters.state, state];
    void setFilters({ state: next.length === 0 ? null : next });
  };
  const none = filters.state.length === 0 && filters.category === null;
  return (
    <div
      role="search"
      aria-label="Parts"
      className="flex items-center gap-2 border-b border-rule bg-bench px-4 py-1.5 max-md:flex-wrap md:px-6"
    >
      <Input
        ref={searchRef}
        type="search"
        aria-label="Find asset, part or material"
        placeholder="Asset, part or material"
        value={filters.q}
        onChange={(event) => void setFilters({ q: event.target.value === '' ? null : event.target.value })}
        className="w-full md:w-60"
      />
      <div className="flex min-w-0 flex-1 gap-2 overflow-x-auto py-0.5">
        <Chip pressed={none} count={counts?.total} onClick={() => void setFilters({ state: null, category: null })}>
          All
        </Chip>
        {CHIP_STATES.filter((state) => (counts?.by_state[state] ?? 0) > 0 || filters.state.includes(state)).map(
          (state) => (
            <Chip
              key={state}
              pressed={filters.state.includes(state)}
              count={counts?.by_state[state] ?? 0}
              onClick={() => toggleState(state)}
            >
              {capital(STATE_WORDS[state])}
            </Chip>
          ),
        )}
        {CATEGORIES.filter((category) => (counts?.by_category[category] ?? 0) > 0).map((category) => (
          <Chip
            key={category}
            pressed={filters.category === category}
            onClick={() => void setFilters({ category: filters.category === category ? null : category })}
          >
            {CATEGORY_PLURALS[category]}
          </Chip>
        ))}
      </div>
      <p className="text-14 whitespace-nowrap text-ink-3 max-xl:hidden">
        {frame.linear_unit} · kg · {frame.up_axis} up
      </p>
      <IconButton
        label="Group by asset"
        aria-pressed={!filters.flat}
        onClick={() => void setFilters({ flat: filters.flat ? null : true })}
      >
        <ListTree aria-hidden />
      </IconButton>
      <ColumnsMenu columns={filters.columns} onColumns={(columns) => void setFilters({ columns })} />
      <IconButton
        label="Inspector"
        shortcut="I"
        aria-pressed={inspectorOpen}
        onClick={onInspector}
        className="max-lg:hidden"
      >
        <PanelRight aria-hidden />
      </IconButton>
    </div>
  );
}
