'use client';

import { useId, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { cn } from '@/components/ui/cn';
import { Field } from '@/components/ui/field';
import { Select } from '@/components/ui/select';
import type { DeskOptions } from '@/hooks/use-import-desk';
import { BOUNDARY_WORDS, PARTITION_WORDS, SCHEME_WORDS } from '@/lib/rules/measure-words';
import { BOUNDARY_NAMES, PARTITION_NAMES, SCHEME_NAMES } from '@/lib/rules/show-words';
import { measureWords } from './measure-option-words';

interface DeskSettingsProps {
  options: DeskOptions;
  standard: DeskOptions;
  disabled: boolean;
  onChange: (options: DeskOptions) => void;
}

/** How this import's files are measured; the show's own choice unless somebody says otherwise. One line to open where the page is narrow. */
export function DeskSettings({ options, standard, disabled, onChange }: DeskSettingsProps) {
  const [isOpen, setIsOpen] = useState(false);
  const id = useId();
  const choices = <Word extends string>(words: readonly Word[], names: Record<Word, string>, own: Word) =>
    words.map((word) => ({ value: word, label: names[word], detail: word === own ? 'show' : undefined }));
  return (
    <div>
      <div className="flex items-center gap-3 text-13 sm:hidden">
        <span className="text-ink-3">Measured</span>
        <span className="min-w-0 flex-1 truncate text-ink-2">{isOpen ? '' : measureWords({ scheme: options.scheme, parts_by: options.partsBy, weld: options.weld, turn_faces: options.turnFaces }).join(', ')}</span>
        <Button size="small" look="quiet" className="-mr-2.5" aria-expanded={isOpen} aria-controls={id} onClick={() => setIsOpen(!isOpen)}>
          {isOpen ? 'Close' : 'Change'}
        </Button>
      </div>
      <div id={id} className={cn('grid grid-cols-2 gap-x-3 gap-y-2 sm:flex sm:flex-wrap sm:gap-x-4', !isOpen && 'max-sm:hidden')}>
        <Field label="Scheme" className="sm:w-52">
          <Select
            options={choices(SCHEME_WORDS, SCHEME_NAMES, standard.scheme)}
            value={options.scheme}
            disabled={disabled}
            onValueChange={(value) => onChange({ ...options, scheme: SCHEME_WORDS.find((word) => word === value) ?? options.scheme })}
          />
        </Field>
        <Field label="Open borders" className="order-last col-span-2 sm:order-none sm:w-52">
          <Select
            options={choices(BOUNDARY_WORDS, BOUNDARY_NAMES, standard.boundary)}
            value={options.boundary}
            disabled={disabled}
            onValueChange={(value) => onChange({ ...options, boundary: BOUNDARY_WORDS.find((word) => word === value) ?? options.boundary })}
          />
        </Field>
        <Field label="A part is" className="sm:w-44">
          <Select
            options={choices(PARTITION_WORDS, PARTITION_NAMES, standard.partsBy)}
            value={options.partsBy}
            disabled={disabled}
            onValueChange={(value) => onChange({ ...options, partsBy: PARTITION_WORDS.find((word) => word === value) ?? options.partsBy })}
          />
        </Field>
        <div className="order-last col-span-2 flex flex-col justify-end gap-1.5 pb-1 text-13">
          <Mend label="Turn faces outwards" checked={options.turnFaces} disabled={disabled} onChange={(turnFaces) => onChange({ ...options, turnFaces })} />
          <Mend label="Weld open borders" checked={options.weld} disabled={disabled} onChange={(weld) => onChange({ ...options, weld })} />
        </div>
      </div>
    </div>
  );
}

/** A change to the cage before it is measured; the report notes what it did. */
function Mend({ label, checked, disabled, onChange }: { label: string; checked: boolean; disabled: boolean; onChange: (checked: boolean) => void }) {
  const id = useId();
  return (
    <span className="flex items-center gap-2">
      <Checkbox id={id} checked={checked} disabled={disabled} onCheckedChange={(state) => onChange(state === true)} />
      <label htmlFor={id} className="text-ink-2">
        {label}
      </label>
    </span>
  );
}
