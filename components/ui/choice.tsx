'use client';

import { RadioGroup } from 'radix-ui';

interface ChoiceProps<Value extends string> {
  label: string;
  value: Value;
  options: readonly { value: Value; label: string }[];
  onChange: (value: Value) => void;
  disabled?: boolean;
}

/** One of a few words, all of them in sight. */
export function Choice<Value extends string>({ label, value, options, onChange, disabled }: ChoiceProps<Value>) {
  return (
    <RadioGroup.Root value={value} onValueChange={(next) => onChange(next as Value)} aria-label={label} disabled={disabled} className="flex flex-wrap gap-2">
      {options.map((option) => (
        <RadioGroup.Item
          key={option.value}
          value={option.value}
          className="inline-flex h-8 items-center gap-2 rounded border border-edge px-3 text-14 text-ink-2 hover:border-ink-2 hover:text-ink data-[state=checked]:border-brass data-[state=checked]:text-ink pointer-coarse:h-11"
        >
          <span aria-hidden className="inline-flex size-3 items-center justify-center rounded-full border border-edge">
            <RadioGroup.Indicator className="size-1.5 rounded-full bg-brass" />
          </span>
          {option.label}
        </RadioGroup.Item>
      ))}
    </RadioGroup.Root>
  );
}
