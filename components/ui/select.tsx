'use client';

import { Check, ChevronDown } from 'lucide-react';
import { Select as Primitive } from 'radix-ui';
import { cn } from './cn';
import { controlStyle } from './input';

export interface SelectOption {
  value: string;
  label: string;
  /** Said after the label in a fainter ink, such as a unit or a count. */
  detail?: string;
}

interface SelectProps {
  options: readonly SelectOption[];
  value: string;
  onValueChange: (value: string) => void;
  id?: string;
  name?: string;
  disabled?: boolean;
  placeholder?: string;
  className?: string;
  'aria-label'?: string;
  'aria-describedby'?: string;
  'aria-invalid'?: boolean;
}

/** A choice of one from a short list. */
export function Select({
  options,
  value,
  onValueChange,
  name,
  disabled,
  placeholder,
  className,
  ...trigger
}: SelectProps) {
  return (
    <Primitive.Root value={value} onValueChange={onValueChange} name={name} disabled={disabled}>
      <Primitive.Trigger
        className={cn(
          controlStyle(),
          'inline-flex h-8 items-center justify-between gap-2 text-left data-placeholder:text-ink-3 pointer-coarse:h-11',
          className,
        )}
        {...trigger}
      >
        {/* Said by us, so that it stands in the server's page too: the primitive knows it only once the page is alive. */}
        <Primitive.Value placeholder={placeholder}>{options.find((option) => option.value === value)?.label}</Primitive.Value>
        <Primitive.Icon asChild>
          <ChevronDown aria-hidden className="size-4 shrink-0 text-ink-3" />
        </Primitive.Icon>
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          position="popper"
          sideOffset={4}
          className="z-50 max-h-(--radix-select-content-available-height) min-w-(--radix-select-trigger-width) overflow-hidden rounded border border-edge bg-raised"
        >
          <Primitive.Viewport className="p-1">
            {options.map((option) => (
              <Primitive.Item
                key={option.value}
                value={option.value}
                className="flex h-8 items-center gap-2 rounded pr-8 pl-2 text-14 text-ink outline-none select-none data-highlighted:bg-selected pointer-coarse:h-11"
              >
                <Primitive.ItemText>{option.label}</Primitive.ItemText>
                {option.detail === undefined ? null : <span className="text-13 text-ink-3">{option.detail}</span>}
                <Primitive.ItemIndicator className="absolute right-3">
                  <Check aria-hidden className="size-4 text-brass" />
                </Primitive.ItemIndicator>
              </Primitive.Item>
            ))}
          </Primitive.Viewport>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
