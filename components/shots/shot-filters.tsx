'use client';

import { Chip } from '@/components/ui/chip';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import { useShotFilters } from '@/hooks/use-shot-filters';
import type { ShotFilter } from '@/lib/rules/inputs/list-shots';

const EVERY = ' every';

interface ShotFiltersProps {
  counts: { shots: number } & Record<ShotFilter, number>;
  assets: readonly string[];
}

/** Which shots the list shows. */
export function ShotFilters({ counts, assets }: ShotFiltersProps) {
  const { filters, setFilters, reading } = useShotFilters();
  const chip = (state: ShotFilter | null, label: string, count: number) => (
    <Chip pressed={filters.state === state} count={count} onClick={() => void setFilters({ state, cursor: null })}>
      {label}
    </Chip>
  );
  return (
    <div role="search" aria-label="Shots" aria-busy={reading} className="flex flex-wrap items-center gap-2 border-b border-rule bg-bench px-4 py-1.5 md:px-6">
      <Input
        type="search"
        aria-label="Sequence, shot or title"
        placeholder="Sequence, shot or title"
        value={filters.q}
        onChange={(event) => void setFilters({ q: event.target.value || null, cursor: null })}
        className="w-full md:w-60"
      />
      <Select
        aria-label="Asset"
        value={filters.asset === '' ? EVERY : filters.asset}
        onValueChange={(asset) => void setFilters({ asset: asset === EVERY ? null : asset, cursor: null })}
        options={[{ value: EVERY, label: 'Every asset' }, ...(filters.asset === '' || assets.includes(filters.asset) ? assets : [filters.asset, ...assets]).map((asset) => ({ value: asset, label: asset }))]}
        className="w-full md:w-44"
      />
      {chip(null, 'All', counts.shots)}
      {chip('missing', 'Missing', counts.missing)}
      {chip('outdated', 'Out of date', counts.outdated)}
      {chip('complete', 'Complete', counts.complete)}
    </div>
  );
}
