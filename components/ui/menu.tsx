'use client';

import { Check } from 'lucide-react';
import { DropdownMenu as Primitive } from 'radix-ui';
import type { ReactElement, ReactNode } from 'react';

interface MenuProps {
  trigger: ReactElement;
  align?: 'start' | 'end';
  children: ReactNode;
}

const itemStyle =
  'relative flex h-8 items-center gap-2 rounded pr-3 pl-7 text-14 text-ink outline-none select-none data-disabled:opacity-50 data-highlighted:bg-selected pointer-coarse:h-11';

/** A list of acts at its trigger. */
export function Menu({ trigger, align = 'end', children }: MenuProps) {
  return (
    <Primitive.Root modal={false}>
      <Primitive.Trigger asChild>{trigger}</Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          align={align}
          sideOffset={6}
          collisionPadding={8}
          className="z-50 min-w-48 rounded border border-edge bg-raised p-1"
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

export function MenuItem({
  onSelect,
  disabled,
  asChild,
  children,
}: {
  onSelect?: () => void;
  disabled?: boolean;
  asChild?: boolean;
  children: ReactNode;
}) {
  return (
    <Primitive.Item className={itemStyle} onSelect={onSelect} disabled={disabled} asChild={asChild}>
      {children}
    </Primitive.Item>
  );
}

export function MenuChoice<T extends string>({
  label,
  value,
  onValueChange,
  options,
}: {
  label: string;
  value: T;
  onValueChange: (value: T) => void;
  options: readonly { value: T; label: string }[];
}) {
  return (
    <Primitive.RadioGroup value={value} onValueChange={(next) => onValueChange(next as T)} aria-label={label}>
      <Primitive.Label className="px-2 pt-2 pb-1 text-12 text-ink-3">{label}</Primitive.Label>
      {options.map((option) => (
        <Primitive.RadioItem key={option.value} value={option.value} className={itemStyle}>
          <Primitive.ItemIndicator className="absolute left-2">
            <Check aria-hidden className="size-4 text-brass" />
          </Primitive.ItemIndicator>
          {option.label}
        </Primitive.RadioItem>
      ))}
    </Primitive.RadioGroup>
  );
}

export function MenuToggle({
  checked,
  onCheckedChange,
  children,
}: {
  checked: boolean;
  onCheckedChange: (checked: boolean) => void;
  children: ReactNode;
}) {
  return (
    <Primitive.CheckboxItem
      className={itemStyle}
      checked={checked}
      onCheckedChange={onCheckedChange}
      onSelect={(event) => event.preventDefault()}
    >
      <Primitive.ItemIndicator className="absolute left-2">
        <Check aria-hidden className="size-4 text-brass" />
      </Primitive.ItemIndicator>
      {children}
    </Primitive.CheckboxItem>
  );
}

export function MenuRule() {
  return <Primitive.Separator className="-mx-1 my-1 h-px bg-rule" />;
}

export function MenuNote({ children }: { children: ReactNode }) {
  return <Primitive.Label className="px-2 pt-1.5 pb-2 text-13 text-ink-2">{children}</Primitive.Label>;
}
