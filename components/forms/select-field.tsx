'use client';

import type { ReactNode } from 'react';
import { Controller, type Control, type FieldValues, type Path } from 'react-hook-form';
import { Field } from '@/components/ui/field';
import { Select, type SelectOption } from '@/components/ui/select';

interface SelectFieldProps<Values extends FieldValues, Parsed> {
  control: Control<Values, unknown, Parsed>;
  name: Path<Values>;
  label: string;
  options: readonly SelectOption[];
  hint?: ReactNode;
  error?: string | null;
  disabled?: boolean;
  className?: string;
}

/** A choice of one from a short list, as a field of a form. */
export function SelectField<Values extends FieldValues, Parsed>({
  control,
  name,
  label,
  options,
  hint,
  error,
  disabled,
  className,
}: SelectFieldProps<Values, Parsed>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field }) => (
        <Field label={label} hint={hint} error={error} className={className}>
          <Select
            options={options}
            value={field.value as string}
            onValueChange={field.onChange}
            disabled={disabled}
            className="w-full"
          />
        </Field>
      )}
    />
  );
}
