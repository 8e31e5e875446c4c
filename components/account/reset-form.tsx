'use client';

import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { resetPasswordInput, type ResetPasswordInput } from '@/lib/rules/inputs/reset-password';
import { NewPasswordField } from './new-password-field';
import { signInAndGo } from './sign-in-and-go';

interface ResetFormProps {
  secret: string;
  email: string;
  send: (input: ResetPasswordInput) => Promise<ActionResult<{ email: string }>>;
}

/** A new password, by a link that was mailed. */
export function ResetForm({ secret, email, send }: ResetFormProps) {
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: resetPasswordInput,
    defaultValues: { secret, password: '' },
    send,
    onDone: (done, input) => signInAndGo(done.email, input.password, '/shows'),
  });
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-4">
      <p className="text-14 text-ink-2">
        For <span className="text-ink">{email}</span>. Every session of yours ends.
      </p>
      <input type="email" name="email" autoComplete="username" value={email} readOnly hidden />
      <NewPasswordField form={form} name="password" error={errorOf('password')} label="New password" />
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" look="filled" className="mt-2 h-10" disabled={busy}>
        {busy ? 'Saving' : 'Save and sign in'}
      </Button>
    </form>
  );
}
