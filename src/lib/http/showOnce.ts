import type { AstroCookies } from 'astro';
import { isHttps, pathCookieName } from './cookieName';

const LIFETIME_SEC = 300;

/**
 * Keeps a secret just made for the page that a redirect leads to, which shows it once. It travels in a cookie that only this
 * path gets, that no script reads and that the showing ends; nothing in the clear is stored here.
 */
export function keepOnce(cookies: AstroCookies, path: string, secret: string): void {
  cookies.set(pathCookieName('once'), secret, { ...attributes(path), maxAge: LIFETIME_SEC });
}

/** The secret kept for this page, if one is, and never again. */
export function takeOnce(cookies: AstroCookies, path: string): string | null {
  const secret = cookies.get(pathCookieName('once'))?.value ?? null;
  if (secret !== null) cookies.delete(pathCookieName('once'), attributes(path));
  return secret;
}

function attributes(path: string) {
  return {
    path: encodeURI(decodeURI(path)),
    httpOnly: true,
    sameSite: 'strict',
    secure: isHttps(),
  } as const;
}
