'use client';

import { useRouter } from 'next/navigation';
import { useWatch } from 'react-hook-form';
import { toast } from 'sonner';
import { z } from 'zod';
import { FormRefusal } from '@/components/forms/form-refusal';
import { SelectField } from '@/components/forms/select-field';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { useActionForm } from '@/hooks/use-action-form';
import type { ActionResult } from '@/lib/rules/action-result';
import { emailField } from '@/lib/rules/fields';
import { ROLES, ROLE_NAMES, type Role } from '@/lib/rules/roles';
import { ROLE_SENTENCES } from '@/lib/rules/show-words';
import { splitWords } from '@/lib/rules/split-words';
import { wordsToOptions } from '@/lib/rules/words-to-options';
import type { MemberChange } from './member-table';

const formSchema = z.strictObject({ email: emailField, role: z.enum(ROLES), shots: z.string(), assets: z.string() });
const roles = wordsToOptions(ROLES, ROLE_NAMES);

interface AddMemberFormProps {
  show: string;
  send: (input: MemberChange) => Promise<ActionResult<{ email: string; name: string; invited: boolean }>>;
}

/** Lets somebody into the show; who has no account yet gets an invitation by e-mail. */
export function AddMemberForm({ show, send }: AddMemberFormProps) {
  const router = useRouter();
  const { form, onSubmit, refusal, busy, errorOf } = useActionForm({
    schema: formSchema,
    defaultValues: { email: '', role: 'artist' as Role, shots: '', assets: '' },
    send: ({ email, role, shots, assets }) =>
      send({
        show,
        email,
        role,
        ...(role === 'guest' ? { shots: splitWords(shots), assets: splitWords(assets) } : {}),
      }),
    onDone: (member) => {
      toast(member.invited ? `An invitation to ${member.email} is on its way` : `${member.name} is in the show`);
      form.reset();
      router.refresh();
    },
  });
  const role = useWatch({ control: form.control, name: 'role' });
  return (
    <form method="post" noValidate onSubmit={onSubmit} className="flex flex-col gap-3">
      <div className="grid items-start gap-3 sm:grid-cols-[1fr_11rem_auto]">
        <Field label="E-mail" error={errorOf('email')}>
          <Input type="email" autoComplete="off" {...form.register('email')} />
        </Field>
        <SelectField control={form.control} name="role" label="Role" options={roles} />
        <Button type="submit" disabled={busy} className="sm:mt-6">
          {busy ? 'Adding' : 'Add'}
        </Button>
      </div>
      <p className="text-13 text-ink-3">{ROLE_SENTENCES[role]}</p>
      {role === 'guest' ? (
        <div className="grid gap-3 sm:grid-cols-2">
          <Field label="Shots" error={errorOf('shots')}>
            <Input className="font-mono" spellCheck={false} {...form.register('shots')} />
          </Field>
          <Field label="Assets" error={errorOf('assets')}>
            <Input className="font-mono" spellCheck={false} {...form.register('assets')} />
          </Field>
        </div>
      ) : null}
      <FormRefusal>{refusal}</FormRefusal>
    </form>
  );
}
