import { afterEach, expect, test, vi } from 'vitest';

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
  const kept: Kept[] = [];
  const cookies = {
    set: (name: string, value: string, options: Kept['options']) => kept.push({ name, value, options }),
  };
  keepTheme(cookies as never, 'dark');
  keepOnce(cookies as never, '/n/merrow/alerts', 'a secret');
  return [...kept, { name: sessionCookieName(), value: '', options: {} }];
}

test('under https no neighbouring host can set a cookie of ours', async () => {
  const [theme, once, session] = await cookiesAt('https://noise.merrow.example');
  expect(theme?.name).toBe('__Host-bittern-theme');
  // What browsers ask of the prefix: secure, every path, no domain.
  expect(theme?.options).toMatchObject({ path: '/', secure: true, httpOnly: true, sameSite: 'lax' });
  expect(theme?.options.domain).toBeUndefined();
  expect(once?.name).toBe('__Secure-bittern-once');
  expect(once?.options).toMatchObject({ path: '/n/merrow/alerts', secure: true, httpOnly: true });
  expect(session?.name).toBe('__Host-bittern-session');
});

test('on loopback without https names are plain, and browsers keep them', async () => {
  const [theme, once, session] = await cookiesAt('http://127.0.0.1:4321');
  expect([theme?.name, once?.name, session?.name]).toEqual([
    'bittern-theme',
    'bittern-once',
    'bittern-session',
  ]);
  expect(theme?.options.secure).toBe(false);
});
