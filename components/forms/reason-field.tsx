'use client';

import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';

interface ReasonFieldProps {
  value: string;
  /** Whether it was asked for in vain. */
  missing: boolean;
  hint?: string;
  onChange: (value: string) => void;
}

/** Why something is done: it stands in the history and is read by those who are told. */
export function ReasonField({ value, missing, hint, onChange }: ReasonFieldProps) {
  return (
    <Field label="Reason" error={missing ? 'Say why.' : null} hint={hint}>
      <Input value={value} maxLength={500} autoComplete="off" onChange={(event) => onChange(event.target.value)} />
    </Field>
  );
}
