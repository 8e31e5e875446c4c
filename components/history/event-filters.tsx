'use client';

import { useRouter } from 'next/navigation';
import { parseAsString, useQueryStates } from 'nuqs';
import { useTransition } from 'react';
import { Button } from '@/components/ui/button';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import { actWords } from '@/lib/rules/act-words';

const ANY = 'any';
const NAMES = ['act', 'person', 'part', 'shot', 'from', 'to'] as const;
type Name = (typeof NAMES)[number];

interface EventFiltersProps {
  acts: readonly string[];
  people: readonly { name: string; email: string }[];
  /** What the page is about already and does not ask for. */
  without: readonly Name[];
}

/** Filters of a history, kept in the address. */
export function EventFilters({ acts, people, without }: EventFiltersProps) {
  const router = useRouter();
  const [, start] = useTransition();
  const text = parseAsString.withDefault('');
  const [filters, setFilters] = useQueryStates({ act: text, person: text, part: text, shot: text, from: text, to: text, before: text }, { shallow: false, startTransition: start, clearOnDefault: true });
  const asks = (name: Name) => !without.includes(name);
  const isFiltered = NAMES.some((name) => asks(name) && filters[name] !== '');
  const change = (name: Name, value: string) => void setFilters({ [name]: value === ANY ? '' : value, before: '' });
  return (
    <form
      key={NAMES.map((name) => filters[name]).join(' ')}
      className="flex flex-wrap items-end gap-x-2 gap-y-3 border-b border-rule px-4 py-3 md:px-6"
      onSubmit={(event) => {
        event.preventDefault();
        const data = new FormData(event.currentTarget);
        const said = NAMES.filter((name) => data.has(name)).map((name) => [name, String(data.get(name)).trim()]);
        void setFilters({ ...Object.fromEntries(said), before: '' });
      }}
    >
      <Select
        aria-label="Act"
        value={filters.act || ANY}
        onValueChange={(value) => change('act', value)}
        options={[{ value: ANY, label: 'Every act' }, ...acts.map((act) => ({ value: act, label: actWords(act) }))]}
        className="w-52"
      />
      <Select
        aria-label="Person"
        value={filters.person || ANY}
        onValueChange={(value) => change('person', value)}
        options={[{ value: ANY, label: 'Everybody' }, ...people.map(({ name, email }) => ({ value: email, label: name }))]}
        className="w-44"
      />
      {asks('part') ? <Input name="part" aria-label="Part or asset" placeholder="Part or asset" defaultValue={filters.part} className="w-44 font-mono" spellCheck={false} /> : null}
      {asks('shot') ? <Input name="shot" aria-label="Shot" placeholder="Shot" defaultValue={filters.shot} className="w-32 font-mono" spellCheck={false} /> : null}
      <label className="flex items-center gap-2 text-13 text-ink-2">
        From
        <Input type="date" name="from" defaultValue={filters.from} className="w-36" />
      </label>
      <label className="flex items-center gap-2 text-13 text-ink-2">
        to
        <Input type="date" name="to" defaultValue={filters.to} className="w-36" />
        <span className="text-ink-3">UTC</span>
      </label>
      <Button type="submit">Find</Button>
      {isFiltered ? (
        <Button look="quiet" onClick={() => router.push('?')}>
          Show all
        </Button>
      ) : null}
    </form>
  );
}
