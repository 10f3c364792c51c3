import type { AstroCookies } from 'astro';
import { cookieName, isHttps } from './cookieName';

const YEAR_SEC = 365 * 86_400;

/** Colours that a person chose; null: as the device has it. */
export type Theme = 'light' | 'dark' | null;

/** The chosen colours. */
export function chosenTheme(cookies: Pick<AstroCookies, 'get'>): Theme {
  const chosen = cookies.get(cookieName('theme'))?.value;
  return chosen === 'light' || chosen === 'dark' ? chosen : null;
}

/** Keeps chosen colours for a year. */
export function keepTheme(cookies: AstroCookies, theme: Theme): void {
  const attributes = { path: '/', sameSite: 'lax', httpOnly: true, secure: isHttps() } as const;
  if (theme === null) cookies.delete(cookieName('theme'), attributes);
  else cookies.set(cookieName('theme'), theme, { ...attributes, maxAge: YEAR_SEC });
}
