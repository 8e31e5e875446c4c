export const THEMES = ['dark', 'light', 'system'] as const;
export type Theme = (typeof THEMES)[number];

export const THEME_COOKIE = 'weighhouse-theme';

/** The theme a cookie asks for; dark where it asks for none of ours. */
export function themeOf(cookie: string | undefined): Theme {
  return THEMES.find((theme) => theme === cookie) ?? 'dark';
}
