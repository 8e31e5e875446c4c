'use client';

import type { FieldValues, Path, UseFormReturn } from 'react-hook-form';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
import { PASSWORD_SENTENCE } from '@/lib/rules/password-rule';

/** The field of a new password, with the rule beside it. */
export function NewPasswordField<Values extends FieldValues, Parsed>({
  form,
  name,
  error,
  label = 'Password',
}: {
  form: UseFormReturn<Values, unknown, Parsed>;
  name: Path<Values>;
  error: string | null;
  label?: string;
}) {
  return (
    <Field label={label} hint={PASSWORD_SENTENCE} error={error}>
      <Input type="password" autoComplete="new-password" className="h-10" {...form.register(name)} />
    </Field>
  );
}
