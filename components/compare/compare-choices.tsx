'use client';

import { usePathname, useRouter, useSearchParams } from 'next/navigation';
import { Field } from '@/components/ui/field';
import { Select, type SelectOption } from '@/components/ui/select';
import type { ComparedSide, ComparisonAnswer } from '@/lib/rules/comparison';

/** A value that no part is named: the select cannot hold an empty text. */
const WHOLE = '*';

/** What is compared with what; the choice goes into the address. */
export function CompareChoices({ of }: { of: ComparisonAnswer }) {
  const router = useRouter();
  const path = usePathname();
  const search = useSearchParams();

  function choose(changes: Record<string, string | null>) {
    const query = new URLSearchParams(search);
    for (const [name, value] of Object.entries(changes)) {
      if (value === null) query.delete(name);
      else query.set(name, value);
    }
    router.replace(`${path}?${query}`, { scroll: false });
  }

  const parts = [
    { value: WHOLE, label: 'All parts together' },
    ...of.parts.map((part) => ({ value: part, label: part })),
  ];
  return (
    <div className="grid grid-cols-2 gap-x-4 gap-y-3 border-b border-rule bg-bench px-4 py-3 sm:grid-cols-3 md:px-6">
      <Field label="Part" className="max-sm:col-span-2">
        <Select
          value={of.part ?? WHOLE}
          options={
            of.part === null || of.parts.includes(of.part)
              ? parts
              : [...parts, { value: of.part, label: of.part, detail: 'not current' }]
          }
          onValueChange={(part) =>
            choose({
              asset: of.asset,
              part: part === WHOLE ? null : part,
              lock: null,
              shot: null,
              ...(of.lock ? { a: null } : {}),
            })
          }
        />
      </Field>
      <Field label="Before">
        <Select
          value={of.before.ref}
          options={sideOptions(of, of.before)}
          onValueChange={(a) => choose({ asset: of.asset, part: of.part, a, lock: null })}
        />
      </Field>
      <Field label="After">
        <Select value={of.after.ref} options={sideOptions(of, of.after)} onValueChange={(b) => choose({ b })} />
      </Field>
    </div>
  );
}

/** A lock or an override is a choice only where the page was opened with it. */
function sideOptions(of: ComparisonAnswer, side: ComparedSide): SelectOption[] {
  const usual: SelectOption[] = [
    { value: 'current', label: 'Current', detail: of.versions[0] },
    ...(of.has_approval ? [{ value: 'approved', label: 'The last approval' }] : []),
    ...of.versions.map((version) => ({ value: version, label: version, detail: 'with what is set today' })),
  ];
  return usual.some((option) => option.value === side.ref)
    ? usual
    : [{ value: side.ref, label: side.name.charAt(0).toUpperCase() + side.name.slice(1) }, ...usual];
}
