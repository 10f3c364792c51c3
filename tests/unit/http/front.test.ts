import { createServer, request as httpRequest, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, describe, expect, test } from 'vitest';
import { makeFront } from '#ops/http/front';

const plain = { allowedHosts: ['bittern.example'], trustedProxies: 0, origin: 'http://bittern.example' };
let server: Server;
let seen: IncomingHttpHeaders | null;

afterEach(() => new Promise((closed) => server.close(closed)));

async function ask(
  headers: Record<string, string>,
  settings: Omit<Parameters<typeof makeFront>[1], 'importMostBytes'> = plain,
  path = '/n/merrow/map',
  method = 'GET',
): Promise<{ status: number; headers: IncomingHttpHeaders; text: string }> {
  seen = null;
  const astro = (request: { headers: IncomingHttpHeaders }, response: { end(text: string): void }) => {
    seen = request.headers;
    response.end('page');
  };
  server = createServer(makeFront(astro as never, { ...settings, importMostBytes: 1024 * 1024 }));
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  const { port } = server.address() as AddressInfo;
  return new Promise((answered, failed) => {
    const asked = httpRequest({ host: '127.0.0.1', port, path, method, headers, agent: false });
    asked.on('error', failed);
    asked.on('response', (response) => {
      let text = '';
      response.setEncoding('utf8').on('data', (chunk: string) => (text += chunk));
      response.on('end', () =>
        answered({ status: response.statusCode ?? 0, headers: response.headers, text }),
      );
    });
    asked.end();
  });
}

const known = { host: 'bittern.example' };

describe('the front before the pages', () => {
  test('answers only under its own names', async () => {
    expect((await ask({ host: 'elsewhere.example' })).status).toBe(421);
    expect(seen).toBeNull();
  });

  test('forbids framing, plug-ins, type guessing, and telling addresses to other sites', async () => {
    const { status, headers } = await ask(known);
    expect(status).toBe(200);
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['content-security-policy']).toContain("object-src 'none'");
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('same-origin');
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['strict-transport-security']).toBeUndefined();
  });

  test('knows no TRACE', async () => {
    const { status, headers } = await ask(known, plain, '/n/merrow/map', 'TRACE');
    expect(status).toBe(405);
    expect(headers['allow']).not.toContain('TRACE');
    expect(seen).toBeNull();
  });

  test('lets no script run but files of its own and known texts, and maps come from where they are', async () => {
    const settings = { ...plain, mapOrigins: ['https://tiles.example'] };
    const policy = String((await ask(known, settings)).headers['content-security-policy']);
    const directives = new Map(policy.split(';').map((one) => [one.split(' ')[0], one.split(' ').slice(1)]));
    for (const source of directives.get('script-src') ?? [])
      expect(source).toMatch(/^'(self|sha256-[\w+/=]+)'$/);
    expect(directives.get('script-src-attr')).toEqual(["'none'"]);
    expect(directives.get('default-src')).toEqual(["'self'"]);
    expect(directives.get('connect-src')).toEqual(["'self'", 'https://tiles.example']);
    // A proxy's buffer for an answer's headers is often 4 KiB.
    expect(policy.length).toBeLessThan(1500);
  });

  test('tells where to report weaknesses, when that is set', async () => {
    const path = '/.well-known/security.txt';
    expect((await ask(known, plain, path)).text).toBe('page');
    const told = await ask(known, { ...plain, securityContact: 'mailto:security@merrow.example' }, path);
    expect(told.headers['content-type']).toContain('text/plain');
    expect(told.text).toContain('Contact: mailto:security@merrow.example\n');
    const expires = Date.parse(/^Expires: (.+)$/m.exec(told.text)?.[1] ?? '');
    expect(expires - Date.now()).toBeGreaterThan(100 * 86_400_000);
    expect(expires - Date.now()).toBeLessThan(365 * 86_400_000);
  });

  test('asks to stay with https once its address is https', async () => {
    const settings = {
      allowedHosts: ['bittern.example'],
      trustedProxies: 0,
      origin: 'https://bittern.example',
    };
    expect((await ask(known, settings)).headers['strict-transport-security']).toContain('max-age=');
  });

  test('asks for as many days as are set, for none with 0', async () => {
    const secure = { ...plain, origin: 'https://bittern.example' };
    const days = async (hstsDays: number) =>
      (await ask(known, { ...secure, hstsDays })).headers['strict-transport-security'];
    expect(await days(2)).toBe('max-age=172800; includeSubDomains');
    expect(await days(0)).toBeUndefined();
  });

  test('believes no forwarding header of a stranger', async () => {
    await ask({
      ...known,
      'x-forwarded-for': '203.0.113.9',
      'x-forwarded-host': 'evil.example',
      forwarded: 'for=1',
    });
    expect(seen?.['x-forwarded-for']).toBe('127.0.0.1');
    expect(seen?.['x-forwarded-host']).toBeUndefined();
    expect(seen?.['forwarded']).toBeUndefined();
  });

  test('believes as many proxies as it is told of', async () => {
    const settings = {
      allowedHosts: ['bittern.example'],
      trustedProxies: 1,
      origin: 'https://bittern.example',
    };
    await ask({ ...known, 'x-forwarded-for': '198.51.100.1, 203.0.113.9' }, settings);
    expect(seen?.['x-forwarded-for']).toBe('203.0.113.9');
  });

  test('stops what announces itself as too large', async () => {
    expect((await ask({ ...known, 'content-length': String(17 * 1024 * 1024) })).status).toBe(413);
    expect(seen).toBeNull();
  });
});
