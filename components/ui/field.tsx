import { Slot } from 'radix-ui';
import { useId, type ReactElement, type ReactNode } from 'react';
import { cn } from './cn';

interface FieldProps {
  label: string;
  hint?: ReactNode;
  error?: string | null;
  /** The unit of the value, said beside the label so that it never stands in the control. */
  unit?: string;
  className?: string;
  children: ReactElement;
}

/** Label, control, hint and error of one value; the control gets id, aria-describedby and aria-invalid. */
export function Field({ label, hint, error, unit, className, children }: FieldProps) {
  const id = useId();
  const hintId = `${id}-hint`;
  const errorId = `${id}-error`;
  const described = [hint ? hintId : null, error ? errorId : null].filter(Boolean).join(' ');
  return (
    <div className={cn('flex flex-col gap-1', className)}>
      <label htmlFor={id} className="text-13 text-ink-2">
        {label}
        {unit === undefined ? null : <span className="text-ink-3">, {unit}</span>}
      </label>
      <Slot.Root id={id} aria-describedby={described || undefined} aria-invalid={error ? true : undefined}>
        {children}
      </Slot.Root>
      {error ? (
        <p id={errorId} role="alert" className="text-13 text-wrong">
          {error}
        </p>
      ) : null}
      {hint ? (
        <p id={hintId} className="text-13 text-ink-3">
          {hint}
        </p>
      ) : null}
    </div>
  );
}
