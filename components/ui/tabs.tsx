'use client';

import { Tabs as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

interface TabsProps {
  label: string;
  tabs: readonly { value: string; label: string; content: ReactNode }[];
  value?: string;
  defaultValue?: string;
  onValueChange?: (value: string) => void;
  className?: string;
}

/** Panels of one thing, one shown at a time. */
export function Tabs({ label, tabs, value, defaultValue, onValueChange, className }: TabsProps) {
  return (
    <Primitive.Root
      value={value}
      defaultValue={defaultValue ?? tabs[0]?.value}
      onValueChange={onValueChange}
      className={className}
    >
      <Primitive.List aria-label={label} className="flex gap-5 border-b border-rule">
        {tabs.map((tab) => (
          <Primitive.Trigger
            key={tab.value}
            value={tab.value}
            className="-mb-px h-9 border-b-2 border-transparent text-14 text-ink-2 hover:text-ink data-[state=active]:border-brass data-[state=active]:text-ink pointer-coarse:h-11"
          >
            {tab.label}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {tabs.map((tab) => (
        <Primitive.Content key={tab.value} value={tab.value} className="pt-4">
          {tab.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  );
}
