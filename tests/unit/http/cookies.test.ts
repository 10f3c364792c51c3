import { afterEach, beforeEach, expect, test, vi } from 'vitest';

// Settings are read once by the modules that are loaded: here for each address, by nobody else for these.
beforeEach(() => void vi.resetModules());
afterEach(() => {
  vi.resetModules();
  vi.unstubAllEnvs();
});

interface Kept {
  name: string;
  value: string;
  options: { path?: string; secure?: boolean; httpOnly?: boolean; sameSite?: string; domain?: string };
}

/** What is set where the public address is this one. */
async function cookiesAt(origin: string): Promise<Kept[]> {
  vi.stubEnv('BITTERN_ORIGIN', origin);
  vi.stubEnv('BITTERN_DB_PASSWORD', 'not used');
  vi.stubEnv('BITTERN_PERSONAL_DATA_KEY', 'ab'.repeat(32));
  const { keepTheme } = await import('#lib/http/themeCookie');
  const { keepOnce } = await import('#lib/http/showOnce');
  const { sessionCookieName } = await import('#lib/auth/sessions');
  const { deviceCookie } = await import('#lib/auth/device');
  const { noPendingCookie } = await import('#lib/auth/pendingSignIn');
  const kept: Kept[] = [];
  const cookies = {
    set: (name: string, value: string, options: Kept['options']) => kept.push({ name, value, options }),
  };
  keepTheme(cookies as never, 'dark');
  keepOnce(cookies as never, '/n/merrow/alerts', 'a secret');
  const signedIn = [deviceCookie(null), noPendingCookie()].map(({ name, value, attributes }) => ({
    name,
    value,
    options: attributes,
  }));
  return [...kept, { name: sessionCookieName(), value: '', options: {} }, ...signedIn];
}

test('under https no neighbouring host can set a cookie of ours', async () => {
  const [theme, once, session, device, second] = await cookiesAt('https://noise.merrow.example');
  expect(theme?.name).toBe('__Host-bittern-theme');
  // What browsers ask of the prefix: secure, every path, no domain.
  expect(theme?.options).toMatchObject({ path: '/', secure: true, httpOnly: true, sameSite: 'lax' });
  expect(theme?.options.domain).toBeUndefined();
  expect(once?.name).toBe('__Secure-bittern-once');
  expect(once?.options).toMatchObject({ path: '/n/merrow/alerts', secure: true, httpOnly: true });
  expect(session?.name).toBe('__Host-bittern-session');
  expect(device).toMatchObject({ name: '__Host-bittern-device', options: { path: '/', secure: true } });
  expect(second).toMatchObject({ name: '__Host-bittern-second', options: { path: '/', secure: true } });
});

test('on loopback without https names are plain, and browsers keep them', async () => {
  const [theme, once, ...signedIn] = await cookiesAt('http://127.0.0.1:4321');
  expect([theme, once, ...signedIn].map((kept) => kept?.name)).toEqual([
    'bittern-theme',
    'bittern-once',
    'bittern-session',
    'bittern-device',
    'bittern-second',
  ]);
  expect(theme?.options.secure).toBe(false);
});
