'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type DefaultValues, type FieldValues, type Path, type UseFormReturn } from 'react-hook-form';
import type { ZodType } from 'zod';
import type { ActionResult } from '@/lib/rules/action-result';

interface ActionForm<Input extends FieldValues, Parsed> {
  form: UseFormReturn<Input, unknown, Parsed>;
  onSubmit: (event?: React.BaseSyntheticEvent) => Promise<void>;
  /** What was refused that belongs to no field of the form. */
  refusal: string | null;
  busy: boolean;
  /** The error of a field, to hand to its Field. */
  errorOf: (field: Path<Input>) => string | null;
}

/** A form over the very schema that the server parses with: its refusal lands at the field it names, or beside the button. */
export function useActionForm<Input extends FieldValues, Parsed, Output>(options: {
  schema: ZodType<Parsed, Input>;
  defaultValues: DefaultValues<Input>;
  send: (input: Parsed) => Promise<ActionResult<Output>>;
  onDone?: (output: Output, input: Parsed) => void | Promise<void>;
}): ActionForm<Input, Parsed> {
  const { schema, defaultValues, send, onDone } = options;
  const form = useForm<Input, unknown, Parsed>({ resolver: zodResolver(schema), defaultValues });
  const { errors, isSubmitting } = form.formState;

  const onSubmit = form.handleSubmit(async (input) => {
    const result = await send(input).catch((): ActionResult<Output> => unreached);
    if (result.ok) return void (await onDone?.(result.data, input));
    const field = result.field !== null && result.field in form.getValues() ? (result.field as Path<Input>) : 'root';
    form.setError(field, { message: result.message }, { shouldFocus: true });
  }, (found) => {
    // What is wrong with no field of the form would otherwise stay unseen.
    const stray = Object.entries(found).find(([name]) => !(name in form.getValues()));
    if (stray) form.setError('root', { message: typeof stray[1]?.message === 'string' ? stray[1].message : 'This form cannot be sent as it is.' });
  });

  return {
    form,
    onSubmit,
    refusal: errors.root?.message ?? null,
    busy: isSubmitting,
    errorOf: (field) => {
      const message = form.getFieldState(field, form.formState).error?.message;
      return typeof message === 'string' ? message : null;
    },
  };
}

const unreached = {
  ok: false as const,
  code: 'not_reached',
  message: 'The server was not reached. Try again.',
  field: null,
  errors: [],
};
