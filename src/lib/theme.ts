/** How a visitor wants the pages: kept in a cookie, so that the server draws them right the first time. */
export const THEMES = ['auto', 'light', 'dark'] as const;
export type Theme = (typeof THEMES)[number];
export const THEME_COOKIE = 'theme';

export function readTheme(value: string | undefined): Theme {
  return THEMES.find((theme) => theme === value) ?? 'auto';
}
