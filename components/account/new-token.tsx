'use client';

import { Check, Copy } from 'lucide-react';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { z } from 'zod';
import { FormRefusal } from '@/components/forms/form-refusal';
import { SelectField } from '@/components/forms/select-field';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { addTokenInput } from '@/lib/rules/inputs/add-token';

const LASTS = [
  { value: '30', label: '30 days' },
  { value: '90', label: '90 days' },
  { value: '365', label: 'A year' },
  { value: 'always', label: 'No end' },
];

const formSchema = z.strictObject({ name: addTokenInput.shape.name, lasts: z.string() });

interface NewTokenProps {
  send: (input: { name: string; days: number | null }) => Promise<ActionResult<{ name: string; token: string }>>;
}

/** Makes a token and shows it this once. */
export function NewToken({ send }: NewTokenProps) {
  const router = useRouter();
  const [made, setMade] = useState<{ name: string; token: string } | null>(null);
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: formSchema,
    defaultValues: { name: '', lasts: '90' },
    send: ({ name, lasts }) => send({ name, days: lasts === 'always' ? null : Number(lasts) }),
    onDone: (token) => {
      setMade(token);
      form.reset();
      router.refresh();
    },
  });
  return (
    <div className="flex flex-col gap-4">
      <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-3">
        <div className="grid items-start gap-3 sm:grid-cols-[1fr_9rem_auto]">
          <Field label="What it is for" error={errorOf('name')}>
            <Input autoComplete="off" {...form.register('name')} />
          </Field>
          <SelectField control={form.control} name="lasts" label="Lasts" options={LASTS} />
          <Button type="submit" disabled={busy} className="sm:mt-6">
            {busy ? 'Making' : 'Make a token'}
          </Button>
        </div>
        <FormRefusal>{refusal}</FormRefusal>
      </form>
      {made === null ? null : (
        <MadeToken key={made.token} name={made.name} token={made.token} onDone={() => setMade(null)} />
      )}
    </div>
  );
}

function MadeToken({ name, token, onDone }: { name: string; token: string; onDone: () => void }) {
  const [copied, setCopied] = useState(false);

  async function copy() {
    await navigator.clipboard.writeText(token);
    setCopied(true);
  }

  return (
    <div role="status" className="flex flex-col gap-3 rounded border border-brass p-4">
      <p className="text-14">The token {name}. It is shown this once: keep it where your script finds it.</p>
      <code className="block font-mono text-13 break-all select-all">{token}</code>
      <div className="flex gap-2">
        <Button onClick={() => void copy()}>
          {copied ? <Check aria-hidden /> : <Copy aria-hidden />}
          {copied ? 'Copied' : 'Copy'}
        </Button>
        <Button look="quiet" onClick={onDone}>
          Done
        </Button>
      </div>
    </div>
  );
}
