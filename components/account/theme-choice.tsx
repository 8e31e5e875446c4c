'use client';

import { Choice } from '@/components/ui/choice';
import { useTheme } from '@/hooks/use-theme';
import { THEMES, type Theme } from '@/lib/rules/themes';

const NAMES: Record<Theme, string> = { dark: 'Dark', light: 'Light', system: 'As the system' };
const OPTIONS = THEMES.map((value) => ({ value, label: NAMES[value] }));

/** The theme of this browser. */
export function ThemeChoice() {
  const [theme, setTheme] = useTheme();
  return <Choice label="Theme" value={theme} options={OPTIONS} onChange={setTheme} />;
}
