'use client';

import { useRouter } from 'next/navigation';
import { toast } from 'sonner';
import { z } from 'zod';
import { CheckField } from '@/components/forms/check-field';
import { FormRefusal } from '@/components/forms/form-refusal';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { emailField, personNameField } from '@/lib/rules/fields';

const formSchema = z.strictObject({ email: emailField, name: personNameField, admin: z.boolean() });

/** Adds a person to the studio; the invitation goes out by e-mail. */
export function AddUserForm({
  send,
}: {
  send: (input: z.infer<typeof formSchema>) => Promise<ActionResult<{ email: string }>>;
}) {
  const router = useRouter();
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: formSchema,
    defaultValues: { email: '', name: '', admin: false },
    send,
    onDone: ({ email }) => {
      toast(`An invitation to ${email} is on its way`);
      form.reset();
      router.refresh();
    },
  });
  return (
    <form
      method="post"
      noValidate
      onSubmit={onSubmit}
      className="flex flex-col gap-3 border-b border-rule px-4 py-5 md:px-6"
    >
      <div className="grid items-start gap-3 md:grid-cols-[minmax(0,20rem)_minmax(0,16rem)_max-content_max-content]">
        <Field label="E-mail" error={errorOf('email')}>
          <Input type="email" autoComplete="off" {...form.register('email')} />
        </Field>
        <Field label="Name" error={errorOf('name')}>
          <Input autoComplete="off" {...form.register('name')} />
        </Field>
        <div className="md:mt-7.5">
          <CheckField control={form.control} name="admin" label="Admin" />
        </div>
        <Button type="submit" look="filled" disabled={busy} className="justify-self-start md:mt-6">
          {busy ? 'Inviting' : 'Invite'}
        </Button>
      </div>
      <FormRefusal>{refusal}</FormRefusal>
    </form>
  );
}
