'use client';

import Link from 'next/link';
import { useState } from 'react';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { requestResetInput, type RequestResetInput } from '@/lib/rules/inputs/request-reset';

interface ResetRequestFormProps {
  /** False where no mail server is set and messages stay in the admin's mailbox. */
  sendsMail: boolean;
  send: (input: RequestResetInput) => Promise<ActionResult<{ sent: true }>>;
}

/** Asks for a link to choose a new password. What it says afterwards is the same for every address. */
export function ResetRequestForm({ sendsMail, send }: ResetRequestFormProps) {
  const [askedFor, setAskedFor] = useState<string | null>(null);
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: requestResetInput,
    defaultValues: { email: '' },
    send,
    onDone: (_done, input) => setAskedFor(input.email),
  });
  if (askedFor !== null) {
    return (
      <div role="status" className="flex flex-col gap-4 text-14">
        <p>
          If {askedFor} has an account here, a message with a link is on its way. The link works once and for two hours.
        </p>
        {sendsMail ? null : (
          <p className="text-ink-2">
            This studio has no mail server set: an admin finds the message in the local mailbox.
          </p>
        )}
        <Link href="/sign-in" className="link self-start">
          Back to sign in
        </Link>
      </div>
    );
  }
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-4">
      <Field label="E-mail" error={errorOf('email')}>
        <Input type="email" autoComplete="username" autoFocus className="h-10" {...form.register('email')} />
      </Field>
      <FormRefusal>{refusal}</FormRefusal>
      <Button type="submit" look="filled" className="mt-2 h-10" disabled={busy}>
        {busy ? 'Sending' : 'Send a link'}
      </Button>
      <Link href="/sign-in" className="link self-start text-13">
        Back to sign in
      </Link>
    </form>
  );
}
