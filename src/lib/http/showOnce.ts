import type { AstroCookies } from 'astro';
import { config } from '#lib/config/index';

const NAME = 'bittern-once';
const LIFETIME_SEC = 300;

/**
 * Keeps a secret just made for the page that a redirect leads to, which shows it once. It travels in a cookie that only this
 * path gets, that no script reads and that the showing ends; nothing in the clear is stored here.
 */
export function keepOnce(cookies: AstroCookies, path: string, secret: string): void {
  cookies.set(NAME, secret, { ...attributes(path), maxAge: LIFETIME_SEC });
}

/** The secret kept for this page, if one is, and never again. */
export function takeOnce(cookies: AstroCookies, path: string): string | null {
  const secret = cookies.get(NAME)?.value ?? null;
  if (secret !== null) cookies.delete(NAME, attributes(path));
  return secret;
}

function attributes(path: string) {
  return {
    path: encodeURI(decodeURI(path)),
    httpOnly: true,
    sameSite: 'strict',
    secure: config().origin.startsWith('https:'),
  } as const;
}
