'use client';

import { useRouter } from 'next/navigation';
import { parseAsString, useQueryStates } from 'nuqs';
import { useTransition } from 'react';
import { Button } from '@/components/ui/button';
import { Input } from '@/components/ui/input';
import { Select } from '@/components/ui/select';
import { actWords } from '@/lib/rules/act-words';

const ANY = 'any';

interface EventFiltersProps {
  acts: readonly string[];
  people: readonly { name: string; email: string }[];
}

/** Filters of a show's history, kept in the address. */
export function EventFilters({ acts, people }: EventFiltersProps) {
  const router = useRouter();
  const [, start] = useTransition();
  const text = parseAsString.withDefault('');
  const [filters, setFilters] = useQueryStates({ act: text, person: text, part: text, before: text }, { shallow: false, startTransition: start, clearOnDefault: true });
  const isFiltered = filters.act !== '' || filters.person !== '' || filters.part !== '';
  const change = (name: 'act' | 'person' | 'part', value: string) => void setFilters({ [name]: value === ANY ? '' : value, before: '' });
  return (
    <div className="flex flex-wrap items-center gap-2 border-b border-rule px-4 py-3 md:px-6">
      <Select
        aria-label="Act"
        value={filters.act || ANY}
        onValueChange={(value) => change('act', value)}
        options={[{ value: ANY, label: 'Every act' }, ...acts.map((act) => ({ value: act, label: actWords(act) }))]}
        className="w-56"
      />
      <Select
        aria-label="Person"
        value={filters.person || ANY}
        onValueChange={(value) => change('person', value)}
        options={[{ value: ANY, label: 'Everybody' }, ...people.map(({ name, email }) => ({ value: email, label: name }))]}
        className="w-52"
      />
      <form
        key={filters.part}
        className="flex gap-2"
        onSubmit={(event) => {
          event.preventDefault();
          change('part', String(new FormData(event.currentTarget).get('part')).trim());
        }}
      >
        <Input name="part" aria-label="Part or asset" placeholder="Part or asset" defaultValue={filters.part} className="w-52 font-mono" spellCheck={false} />
        <Button type="submit">Find</Button>
      </form>
      {isFiltered ? (
        <Button look="quiet" onClick={() => router.push('?')}>
          Show all
        </Button>
      ) : null}
    </div>
  );
}
