'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useWatch } from 'react-hook-form';
import { z } from 'zod';
import { CheckField } from '@/components/forms/check-field';
import { FormRefusal } from '@/components/forms/form-refusal';
import { SelectField } from '@/components/forms/select-field';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { TextArea } from '@/components/ui/text-area';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { emailField } from '@/lib/rules/fields';
import { createShowInput, type CreateShowInput } from '@/lib/rules/inputs/create-show';
import { UNIT_NAMES, UP_AXIS_NAMES } from '@/lib/rules/show-words';
import { splitWords } from '@/lib/rules/split-words';
import { LINEAR_UNITS, UP_AXES } from '@/lib/rules/units';
import { wordsToOptions } from '@/lib/rules/words-to-options';
import { schemeOptions } from './scheme-options';

/** The form's own shape: leads are typed as one text. */
const formSchema = createShowInput.omit({ leads: true, boundary: true, parts_by: true }).extend({
  leads: z.string().superRefine((text, check) => {
    const wrong = splitWords(text).find((word) => !emailField.safeParse(word).success);
    if (wrong !== undefined) check.addIssue({ code: 'custom', message: `${wrong} is not an e-mail address.` });
  }),
});

const units = LINEAR_UNITS.map((value) => ({ value, label: UNIT_NAMES[value], detail: value }));

/** Code, title and what holds for every cage of the show. */
export function CreateShowForm({
  send,
}: {
  send: (input: z.input<typeof createShowInput>) => Promise<ActionResult<{ code: string }>>;
}) {
  const router = useRouter();
  const [more, setMore] = useState(false);
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: formSchema,
    defaultValues: {
      code: '',
      title: '',
      linear_unit: 'cm',
      up_axis: 'y',
      scheme: 'catmull-clark',
      leads: '',
      self_approval: false,
    },
    send: (input) => {
      const leads = splitWords(input.leads);
      return send({
        ...input,
        leads,
        self_approval: input.self_approval && leads.length <= 1,
      } satisfies CreateShowInput);
    },
    onDone: ({ code }) => router.push(`/shows/${encodeURIComponent(code)}`),
  });
  const [leads, scheme] = useWatch({ control: form.control, name: ['leads', 'scheme'] });
  const { control } = form;
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex max-w-xl flex-col gap-5 px-4 py-6 md:px-6">
      <div className="grid gap-5 sm:grid-cols-[10rem_1fr]">
        <Field label="Code" hint="Never changes." error={errorOf('code')}>
          <Input autoFocus autoComplete="off" spellCheck={false} className="font-mono" {...form.register('code')} />
        </Field>
        <Field label="Title" error={errorOf('title')}>
          <Input autoComplete="off" {...form.register('title')} />
        </Field>
      </div>
      <fieldset className="grid min-w-0 gap-x-5 gap-y-4 border-t border-rule pt-4 sm:grid-cols-3">
        <legend className="sr-only">Space</legend>
        <SelectField control={control} name="linear_unit" label="Unit of the cages" options={units} />
        <SelectField
          control={control}
          name="up_axis"
          label="Up axis"
          options={wordsToOptions(UP_AXES, UP_AXIS_NAMES)}
        />
        <SelectField
          control={control}
          name="scheme"
          label="Scheme"
          options={schemeOptions(more, scheme ?? 'catmull-clark')}
        />
        <p className="text-13 text-ink-3 sm:col-span-2">They stay as they are from the first import on.</p>
        {more ? null : (
          <Button look="quiet" size="small" className="-mt-1 justify-self-start" onClick={() => setMore(true)}>
            More schemes
          </Button>
        )}
      </fieldset>
      <fieldset className="flex min-w-0 flex-col gap-4 border-t border-rule pt-4">
        <legend className="sr-only">People</legend>
        <Field
          label="Leads"
          hint="E-mail addresses, separated by commas or lines. Who has no account is invited."
          error={errorOf('leads')}
        >
          <TextArea rows={2} spellCheck={false} {...form.register('leads')} />
        </Field>
        {splitWords(leads ?? '').length <= 1 ? (
          <CheckField
            control={control}
            name="self_approval"
            label="A lead may approve values they set themselves"
            hint="With one lead, nobody else can approve what that lead sets. It can be changed later."
          />
        ) : null}
      </fieldset>
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" look="filled" disabled={busy} className="self-start">
        {busy ? 'Making the show' : 'Make the show'}
      </Button>
    </form>
  );
}
