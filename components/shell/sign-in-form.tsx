'use client';

import { useState, type SubmitEvent } from 'react';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';

interface SignInFormProps {
  /** Signs in and leads on; answers a sentence when it was refused. */
  onSignIn: (email: string, password: string) => Promise<string | null>;
  /** Where a forgotten password is mended; left out while there is no such page. */
  resetHref?: string;
}

export function SignInForm({ onSignIn, resetHref }: SignInFormProps) {
  const [refusal, setRefusal] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);

  async function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    setBusy(true);
    setRefusal(null);
    try {
      setRefusal(await onSignIn(String(form.get('email')), String(form.get('password'))));
    } catch {
      setRefusal('The server was not reached. Try again.');
    } finally {
      setBusy(false);
    }
  }

  return (
    <form method="post" onSubmit={submit} className="flex flex-col gap-4">
      <Field label="E-mail">
        <Input name="email" type="email" autoComplete="username" required autoFocus className="h-10" />
      </Field>
      <Field label="Password" error={refusal}>
        <Input name="password" type="password" autoComplete="current-password" required className="h-10" />
      </Field>
      <Button type="submit" look="filled" className="mt-2 h-10" disabled={busy}>
        {busy ? 'Signing in' : 'Sign in'}
      </Button>
      {resetHref === undefined ? null : (
        <a href={resetHref} className="link self-start text-13">
          Forgotten password
        </a>
      )}
    </form>
  );
}
