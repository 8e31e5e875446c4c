'use client';

import { useEffect, useState } from 'react';
import { useTheme } from './use-theme';

const NAMES = ['ground', 'ink', 'ink-2', 'ink-3', 'edge', 'brass'] as const;
export type TokenColours = Record<(typeof NAMES)[number], string>;

/** What the tokens are in the theme in use, for drawing that CSS does not reach; null before they are known. */
export function useTokenColours(): TokenColours | null {
  const [theme] = useTheme();
  const [colours, setColours] = useState<TokenColours | null>(null);

  useEffect(() => {
    const read = () => {
      const probe = document.createElement('span');
      document.body.append(probe);
      const entries = NAMES.map((name) => {
        probe.style.color = `var(--${name})`;
        return [name, getComputedStyle(probe).color] as const;
      });
      probe.remove();
      setColours(Object.fromEntries(entries) as TokenColours);
    };
    read();
    const media = window.matchMedia('(prefers-color-scheme: light)');
    media.addEventListener('change', read);
    return () => media.removeEventListener('change', read);
  }, [theme]);

  return colours;
}
