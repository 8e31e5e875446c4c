'use client';

import { useId, useState, type SubmitEvent } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import type { Refusal } from '@/hooks/use-act';
import { shotCodeField } from '@/lib/rules/inputs/put-shots';
import { parseAssetsInShot } from '@/lib/rules/parse-shot-list';

interface ShotFormProps {
  assets: readonly string[];
  busy: boolean;
  refusal: Refusal | null;
  onAdd: (shots: { code: string; sequence: string; title: string; assets: { asset: string; copies: number }[] }[]) => void;
}

type Name = 'sequence' | 'code' | 'assets';

/** One shot by hand. */
export function ShotForm({ assets, busy, refusal, onAdd }: ShotFormProps) {
  const [form, setForm] = useState({ sequence: '', code: '', title: '', assets: '' });
  const [errors, setErrors] = useState<Partial<Record<Name, string>>>({});
  const listId = useId();

  const field = (name: keyof typeof form) => ({
    value: form[name],
    autoComplete: 'off',
    spellCheck: false,
    onChange: (event: { target: { value: string } }) => {
      setForm((now) => ({ ...now, [name]: event.target.value }));
      setErrors((now) => ({ ...now, [name]: undefined }));
    },
  });

  function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    const inside = parseAssetsInShot(form.assets);
    const strange = typeof inside === 'string' ? [] : inside.filter((one) => !assets.includes(one.asset)).map((one) => one.asset);
    const codeError = (text: string) => shotCodeField.safeParse(text).error?.issues[0]?.message;
    const found = {
      sequence: codeError(form.sequence),
      code: codeError(form.code),
      assets: typeof inside === 'string' ? inside : strange.length > 0 ? `The show has no ${strange.join(', ')}.` : undefined,
    };
    setErrors(found);
    if (typeof inside === 'string' || Object.values(found).some((error) => error !== undefined)) return;
    onAdd([{ sequence: form.sequence.trim(), code: form.code.trim(), title: form.title.trim(), assets: inside }]);
  }

  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <div className="grid gap-4 sm:grid-cols-2">
        <Field label="Sequence" error={errors.sequence}>
          <Input {...field('sequence')} className="font-mono" />
        </Field>
        <Field label="Shot" error={errors.code}>
          <Input {...field('code')} className="font-mono" />
        </Field>
      </div>
      <Field label="Title" hint="May stay empty.">
        <Input {...field('title')} maxLength={200} />
      </Field>
      <Field label="Assets" hint="Codes with spaces or commas between; a number behind one is its copies: tarnOx, lantern 3." error={errors.assets}>
        <Input {...field('assets')} list={listId} className="font-mono" />
      </Field>
      <datalist id={listId}>
        {assets.map((asset) => (
          <option key={asset} value={asset} />
        ))}
      </datalist>
      <ActRefusal refusal={refusal} />
      <div className="flex justify-end">
        <Button type="submit" look="filled" disabled={busy}>
          {busy ? 'Adding' : 'Add shot'}
        </Button>
      </div>
    </form>
  );
}
