import { randomBytes } from 'node:crypto';
import { cookieName } from '#lib/http/cookieName';
import { cookieNamed, type SessionCookie } from './sessions';

const NAME = 'device';
const KEPT_SEC = 200 * 86_400;

interface Cookies {
  get(name: string): { value: string } | undefined;
}

/** The cookie by which a browser that has signed somebody in is known again; it opens nothing. */
export function deviceOf(cookies: Cookies): string | null {
  const value = cookies.get(cookieName(NAME))?.value ?? '';
  return /^[\w-]{43}$/.test(value) ? value : null;
}

/** The cookie of a browser's device, made where it has none. */
export function deviceCookie(device: string | null): SessionCookie {
  return cookieNamed(NAME, device ?? randomBytes(32).toString('base64url'), KEPT_SEC);
}
