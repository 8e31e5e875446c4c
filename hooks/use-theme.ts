'use client';

import { useSyncExternalStore } from 'react';
import { THEME_COOKIE, themeOf, type Theme } from '@/lib/rules/themes';

const YEAR_S = 31_536_000;

function subscribe(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
  return () => observer.disconnect();
}

function chooseTheme(theme: Theme): void {
  document.documentElement.dataset.theme = theme;
  document.cookie = `${THEME_COOKIE}=${theme}; path=/; max-age=${YEAR_S}; samesite=lax`;
}

/** The theme in use and how to choose another. The server writes it into the page from the cookie, so nothing flashes. */
export function useTheme(): [Theme, (theme: Theme) => void] {
  const theme = useSyncExternalStore(
    subscribe,
    () => themeOf(document.documentElement.dataset.theme),
    () => 'dark' as Theme,
  );
  return [theme, chooseTheme];
}
