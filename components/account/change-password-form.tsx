'use client';

import { toast } from 'sonner';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { changePasswordInput, type ChangePasswordInput } from '@/lib/rules/inputs/change-password';
import { NewPasswordField } from './new-password-field';
import { signInAndGo } from './sign-in-and-go';

/** Changes one's own password: every session ends, and this browser signs in again at once. */
export function ChangePasswordForm({
  email,
  send,
}: {
  email: string;
  send: (input: ChangePasswordInput) => Promise<ActionResult<{ email: string }>>;
}) {
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: changePasswordInput,
    defaultValues: { current: '', password: '' },
    send,
    onDone: async (done, input) => {
      toast('Password changed');
      await signInAndGo(done.email, input.password, '/account');
    },
  });
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex max-w-sm flex-col gap-4">
      <input type="email" name="email" autoComplete="username" value={email} readOnly hidden />
      <Field label="Password now" error={errorOf('current')}>
        <Input type="password" autoComplete="current-password" className="h-10" {...form.register('current')} />
      </Field>
      <NewPasswordField form={form} name="password" label="New password" error={errorOf('password')} />
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" disabled={busy} className="self-start">
        {busy ? 'Changing' : 'Change password'}
      </Button>
      <p className="text-13 text-ink-3">Sessions elsewhere end. Tokens stay good.</p>
    </form>
  );
}
