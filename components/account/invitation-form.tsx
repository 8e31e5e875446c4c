'use client';

import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { acceptInvitationInput, type AcceptInvitationInput } from '@/lib/rules/inputs/accept-invitation';
import { NewPasswordField } from './new-password-field';
import { signInAndGo } from './sign-in-and-go';

interface InvitationFormProps {
  secret: string;
  email: string;
  name: string;
  send: (input: AcceptInvitationInput) => Promise<ActionResult<{ email: string }>>;
}

/** Name and password of somebody who was invited. */
export function InvitationForm({ secret, email, name, send }: InvitationFormProps) {
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: acceptInvitationInput,
    defaultValues: { secret, name, password: '' },
    send,
    onDone: (done, input) => signInAndGo(done.email, input.password, '/shows'),
  });
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-4">
      <p className="text-14 text-ink-2">
        For <span className="text-ink">{email}</span>.
      </p>
      <input type="email" name="email" autoComplete="username" value={email} readOnly hidden />
      <Field label="Your name" error={errorOf('name')}>
        <Input autoComplete="name" className="h-10" defaultValue={name} {...form.register('name')} />
      </Field>
      <NewPasswordField form={form} name="password" error={errorOf('password')} />
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" look="filled" className="mt-2 h-10" disabled={busy}>
        {busy ? 'Setting up' : 'Accept and sign in'}
      </Button>
    </form>
  );
}
