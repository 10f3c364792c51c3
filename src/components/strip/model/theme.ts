import { type Theme } from '#lib/format/levelRamp';

export const PREFERS_DARK = '(prefers-color-scheme: dark)';

/** The theme in force: the one chosen on the page's root element, else the one that the device prefers. */
export function themeNow(): Theme {
  const chosen = document.documentElement.dataset['theme'];
  if (chosen === 'light' || chosen === 'dark') return chosen;
  return matchMedia(PREFERS_DARK).matches ? 'dark' : 'light';
}
