'use client';

import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { createFirstAdminInput, type CreateFirstAdminInput } from '@/lib/rules/inputs/create-first-admin';
import { FormRefusal } from '@/components/forms/form-refusal';
import { NewPasswordField } from './new-password-field';
import { signInAndGo } from './sign-in-and-go';

/** The studio's first person, who lets everybody else in. */
export function FirstAdminForm({
  send,
}: {
  send: (input: CreateFirstAdminInput) => Promise<ActionResult<{ email: string }>>;
}) {
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: createFirstAdminInput,
    defaultValues: { email: '', name: '', password: '' },
    send,
    onDone: ({ email }, input) => signInAndGo(email, input.password, '/shows/new'),
  });
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-4">
      <p className="text-14 text-ink-2">Nobody is here yet. The first person is an admin: they add people and shows.</p>
      <Field label="Your name" error={errorOf('name')}>
        <Input autoComplete="name" autoFocus className="h-10" {...form.register('name')} />
      </Field>
      <Field label="E-mail" error={errorOf('email')}>
        <Input type="email" autoComplete="username" className="h-10" {...form.register('email')} />
      </Field>
      <NewPasswordField form={form} name="password" error={errorOf('password')} />
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" look="filled" className="mt-2 h-10" disabled={busy}>
        {busy ? 'Setting up' : 'Set up the studio'}
      </Button>
    </form>
  );
}
