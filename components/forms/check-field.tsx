'use client';

import { useId, type ReactNode } from 'react';
import { Controller, type Control, type FieldValues, type Path } from 'react-hook-form';
import { Checkbox } from '@/components/ui/checkbox';

interface CheckFieldProps<Values extends FieldValues, Parsed> {
  control: Control<Values, unknown, Parsed>;
  name: Path<Values>;
  label: string;
  hint?: ReactNode;
  disabled?: boolean;
}

/** Yes or no, as a field of a form. */
export function CheckField<Values extends FieldValues, Parsed>({
  control,
  name,
  label,
  hint,
  disabled,
}: CheckFieldProps<Values, Parsed>) {
  const id = useId();
  return (
    <Controller
      control={control}
      name={name}
      render={({ field }) => (
        <div className="flex items-start gap-2.5">
          <Checkbox
            id={id}
            checked={field.value as boolean}
            onCheckedChange={(checked) => field.onChange(checked === true)}
            disabled={disabled}
            aria-describedby={hint ? `${id}-hint` : undefined}
            className="mt-0.5"
          />
          <div>
            <label htmlFor={id} className="text-14 text-ink">
              {label}
            </label>
            {hint ? (
              <p id={`${id}-hint`} className="text-13 text-ink-3">
                {hint}
              </p>
            ) : null}
          </div>
        </div>
      )}
    />
  );
}
