'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Controller, useWatch } from 'react-hook-form';
import { toast } from 'sonner';
import type { z } from 'zod';
import { CheckField } from '@/components/forms/check-field';
import { FormRefusal } from '@/components/forms/form-refusal';
import { SelectField } from '@/components/forms/select-field';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { editShowInput } from '@/lib/rules/inputs/edit-show';
import {
  BOUNDARY_WORDS,
  PARTITION_WORDS,
  type BoundaryWord,
  type PartitionWord,
  type SchemeWord,
} from '@/lib/rules/measure-words';
import { BOUNDARY_NAMES, OTHER_SPACE_NAMES, PARTITION_NAMES, UNIT_NAMES, UP_AXIS_NAMES } from '@/lib/rules/show-words';
import { LINEAR_UNITS, OTHER_SPACE_WORDS, UP_AXES, type LinearUnit, type OtherSpace, type UpAxis } from '@/lib/rules/units';
import { wordsToOptions } from '@/lib/rules/words-to-options';
import { NamePatternField } from './name-pattern-field';
import { schemeOptions } from './scheme-options';

export interface ShowSettings {
  code: string;
  title: string;
  linear_unit: LinearUnit;
  up_axis: UpAxis;
  scheme: SchemeWord;
  boundary: BoundaryWord;
  parts_by: PartitionWord;
  other_space: OtherSpace;
  name_pattern: string | null;
  self_approval: boolean;
  tolerance_mass_percent: number;
  tolerance_com_percent: number;
  tolerance_moments_percent: number;
  frozen: boolean;
  archived: boolean;
}

interface ShowSettingsFormProps {
  show: ShowSettings;
  mayEdit: boolean;
  /** Paths that the show imported, to try a name pattern on. */
  importedNames: readonly string[];
  send: (input: z.input<typeof editShowInput>) => Promise<ActionResult<unknown>>;
}

const TOLERANCES = [
  { name: 'tolerance_mass_percent', label: 'The mass may move', unit: '%' },
  { name: 'tolerance_com_percent', label: 'The centre of mass', unit: '% of size' },
  { name: 'tolerance_moments_percent', label: 'The inertia', unit: '%' },
] as const;

/** A typed percentage; with a comma for a point too. What is none is left for the schema to refuse. */
function readPercent(typed: string | number): number {
  const text = String(typed).trim().replace(',', '.');
  return text === '' ? Number.NaN : Number(text);
}

/** Settings of a show. Only what was changed is sent, so that two leads do not undo each other. */
export function ShowSettingsForm({ show, mayEdit, importedNames, send }: ShowSettingsFormProps) {
  const router = useRouter();
  const [more, setMore] = useState(false);
  const { code, title, linear_unit, up_axis, scheme: storedScheme, boundary, parts_by, other_space, self_approval, frozen, archived } = show;
  const { tolerance_mass_percent, tolerance_com_percent, tolerance_moments_percent } = show;
  const name_pattern = show.name_pattern ?? '';
  const stored = { show: code, title, linear_unit, up_axis, scheme: storedScheme, boundary, parts_by, other_space, name_pattern, self_approval, tolerance_mass_percent, tolerance_com_percent, tolerance_moments_percent };
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: editShowInput,
    defaultValues: stored,
    send: (input) => {
      const changed = Object.entries(input).filter(([field, value]) => value !== stored[field as keyof typeof stored]);
      return send({ ...Object.fromEntries(changed), show: code });
    },
    onDone: (_answer, input) => {
      form.reset(input);
      toast('Settings saved');
      router.refresh();
    },
  });
  const { control } = form;
  const { isDirty } = form.formState;
  const scheme = useWatch({ control, name: 'scheme' }) ?? storedScheme;
  const locked = !mayEdit || archived;
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-6">
      <Field label="Title" error={errorOf('title')}>
        <Input autoComplete="off" disabled={locked} defaultValue={title} {...form.register('title')} />
      </Field>
      <fieldset className="grid min-w-0 gap-x-5 gap-y-3 sm:grid-cols-3">
        <legend className="mb-2 text-16 font-medium">Space</legend>
        <SelectField
          control={control}
          name="linear_unit"
          label="Unit of the cages"
          options={wordsToOptions(LINEAR_UNITS, UNIT_NAMES)}
          disabled={locked || frozen}
          error={errorOf('linear_unit')}
        />
        <SelectField
          control={control}
          name="up_axis"
          label="Up axis"
          options={wordsToOptions(UP_AXES, UP_AXIS_NAMES)}
          disabled={locked || frozen}
          error={errorOf('up_axis')}
        />
        <SelectField
          control={control}
          name="scheme"
          label="Scheme"
          options={schemeOptions(more, scheme)}
          disabled={locked || frozen}
          error={errorOf('scheme')}
        />
        <p className="text-13 text-ink-3 sm:col-span-2">
          {frozen ? 'Fixed since the first import.' : 'They stay as they are from the first import on.'}
        </p>
        {more || locked || frozen ? null : (
          <Button look="quiet" size="small" className="-mt-1 justify-self-start" onClick={() => setMore(true)}>
            More schemes
          </Button>
        )}
      </fieldset>
      <fieldset className="grid min-w-0 gap-x-5 gap-y-4 sm:grid-cols-2">
        <legend className="mb-2 text-16 font-medium">Imports from now on</legend>
        <SelectField
          control={control}
          name="boundary"
          label="Open borders of a cage"
          options={wordsToOptions(BOUNDARY_WORDS, BOUNDARY_NAMES)}
          disabled={locked}
          error={errorOf('boundary')}
        />
        <SelectField
          control={control}
          name="parts_by"
          label="A part is"
          options={wordsToOptions(PARTITION_WORDS, PARTITION_NAMES)}
          disabled={locked}
          error={errorOf('parts_by')}
        />
        <SelectField
          control={control}
          name="other_space"
          label="Files in another unit or up axis"
          options={wordsToOptions(OTHER_SPACE_WORDS, OTHER_SPACE_NAMES)}
          disabled={locked}
          error={errorOf('other_space')}
        />
        <div className="sm:col-span-2">
          <Controller
            control={control}
            name="name_pattern"
            render={({ field }) => (
              <NamePatternField
                value={field.value ?? ''}
                onChange={field.onChange}
                error={errorOf('name_pattern')}
                disabled={locked}
                stored={show.name_pattern}
                names={importedNames}
              />
            )}
          />
        </div>
      </fieldset>
      <fieldset className="flex min-w-0 flex-col gap-4">
        <legend className="mb-2 text-16 font-medium">Approval</legend>
        <div className="grid gap-x-5 gap-y-4 sm:grid-cols-3">
          {TOLERANCES.map(({ name, label, unit }) => (
            <Field key={name} label={label} unit={unit} error={errorOf(name)}>
              <Input
                inputMode="decimal"
                autoComplete="off"
                disabled={locked}
                className="font-mono"
                {...form.register(name, { setValueAs: readPercent })}
              />
            </Field>
          ))}
          <p className="text-13 text-ink-3 sm:col-span-3">
            A value that moves no more than this can be carried over, and nobody is told.
          </p>
        </div>
        <CheckField
          control={control}
          name="self_approval"
          label="Values may be approved by whoever set them"
          hint="Otherwise somebody else has to approve."
          disabled={locked}
        />
      </fieldset>
      <FormRefusal>{refusal}</FormRefusal>
      {locked ? null : (
        <Button type="submit" look="filled" disabled={busy || !isDirty} className="self-start">
          {busy ? 'Saving' : 'Save settings'}
        </Button>
      )}
    </form>
  );
}
