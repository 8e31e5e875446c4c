'use client';

import { RadioGroup } from 'radix-ui';
import { useTheme } from '@/hooks/use-theme';
import { THEMES, type Theme } from '@/lib/rules/themes';

const NAMES: Record<Theme, string> = { dark: 'Dark', light: 'Light', system: 'As the system' };

/** The theme of this browser. */
export function ThemeChoice() {
  const [theme, setTheme] = useTheme();
  return (
    <RadioGroup.Root
      value={theme}
      onValueChange={(value) => setTheme(value as Theme)}
      aria-label="Theme"
      className="flex flex-wrap gap-2"
    >
      {THEMES.map((value) => (
        <RadioGroup.Item
          key={value}
          value={value}
          className="inline-flex h-8 items-center gap-2 rounded border border-edge px-3 text-14 text-ink-2 hover:border-ink-2 hover:text-ink data-[state=checked]:border-brass data-[state=checked]:text-ink pointer-coarse:h-11"
        >
          <span aria-hidden className="inline-flex size-3 items-center justify-center rounded-full border border-edge">
            <RadioGroup.Indicator className="size-1.5 rounded-full bg-brass" />
          </span>
          {NAMES[value]}
        </RadioGroup.Item>
      ))}
    </RadioGroup.Root>
  );
}
