import { execFileSync } from 'node:child_process';
import { once } from 'node:events';
import { request, type RequestOptions } from 'node:https';
import type { IncomingMessage } from 'node:http';
import { connect } from 'node:tls';
import { chromium } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest';
import { CHROMIUM_FLAGS } from '#ops/chromium';
import { PROXIED_IMPORT_MIB, PROXY_NAME, startProxied, type Proxied } from './support/proxied';

const hasNginx = (() => {
  try {
    execFileSync('nginx', ['-v'], { stdio: 'pipe' });
    return true;
  } catch {
    return false;
  }
})();

/** The shipped nginx.conf, run in front of a web. Skipped where nginx is not installed; ops/requirements.sh installs it. */
describe.skipIf(!hasNginx)('behind the proxy', () => {
  let proxied: Proxied;
  let cookie = '';

  beforeAll(async () => {
    proxied = await startProxied();
  }, 90_000);

  afterAll(() => proxied.stop());

  const begin = (options: RequestOptions) =>
    request({
      host: '127.0.0.1',
      port: proxied.httpsPort,
      servername: PROXY_NAME,
      ca: proxied.certificate,
      agent: false,
      ...options,
      headers: { host: PROXY_NAME, ...options.headers },
    });

  async function ask(method: string, path: string, more: RequestOptions & { body?: string | Buffer } = {}) {
    const { body, ...options } = more;
    const asking = begin({ ...options, method, path });
    asking.on('error', () => undefined);
    asking.end(body);
    const [answer] = (await once(asking, 'response')) as [IncomingMessage];
    return { status: answer.statusCode, headers: answer.headers, text: await textOf(answer) };
  }

  const signedIn = (more: Record<string, string> = {}) => ({ headers: { cookie, ...more } });

  test('signing in gives a cookie that belongs to this host alone, and https is kept', async () => {
    const body = JSON.stringify({ email: 'operator@merrow.example', password: inject('demoPassword') });
    const headers = { 'content-type': 'application/json', origin: `https://${PROXY_NAME}` };
    // Whoever calls may say what it likes of where it is.
    const invented = { 'x-forwarded-for': '203.0.113.9', forwarded: 'for=203.0.113.9' };
    const from = { localAddress: '127.0.0.5', headers: { ...headers, ...invented } };
    const answer = await ask('POST', '/api/v1/session', { ...from, body });
    expect(answer.status).toBe(204);
    const session = answer.headers['set-cookie']?.find((one) => one.startsWith('__Host-bittern-session='));
    expect(session).toMatch(/Secure/);
    expect(session).toMatch(/HttpOnly/);
    expect(session).toMatch(/Path=\//);
    expect(session).not.toMatch(/Domain/);
    cookie = session?.split(';')[0] ?? '';
    expect(answer.headers['strict-transport-security']).toMatch(/max-age=31536000/);

    const sessions = JSON.parse((await ask('GET', '/api/v1/me/sessions', signedIn())).text);
    const own = sessions.items.find(({ isThisOne }: { isThisOne: boolean }) => isThisOne);
    expect(own.address).toBe('127.0.0.5');
  });

  test('a form from another site, and another host name, are refused', async () => {
    const foreign = signedIn({ origin: 'https://elsewhere.example', 'content-type': 'application/json' });
    expect((await ask('POST', '/api/v1/me/password', { ...foreign, body: '{}' })).status).toBe(403);
    expect((await ask('GET', '/sign-in', { headers: { host: 'elsewhere.example' } })).status).toBe(421);
    expect((await ask('GET', '/sign-in')).status).toBe(200);
  });

  test('plain http leads people to https, and tells programs', async () => {
    const headers = { host: PROXY_NAME };
    const plain = (path: string) =>
      fetch(`http://127.0.0.1:${proxied.httpPort}${path}`, { redirect: 'manual', headers });
    const page = await plain('/n/merrow/map?at=1');
    expect(page.status).toBe(301);
    expect(page.headers.get('location')).toMatch(/^https:\/\/[^/]+\/n\/merrow\/map\?at=1$/);
    expect((await plain('/api/v1/intervals/last')).status).toBe(403);
    expect((await ask('GET', '/metrics', signedIn())).status).toBe(404);
  });

  test('what happens now comes through as it happens', async () => {
    const asking = begin({
      path: '/api/v1/networks/merrow/live',
      ...signedIn({ 'accept-encoding': 'gzip' }),
    });
    asking.on('error', () => undefined);
    asking.end();
    const [answer] = (await once(asking, 'response')) as [IncomingMessage];
    expect(answer.headers['content-type']).toMatch(/^text\/event-stream/);
    // The stream does not end: only what is not held back can be read at all.
    const [chunk] = (await once(answer, 'data')) as [Buffer];
    expect(chunk.toString()).toMatch(/^(event|retry|:|data)/);
    asking.destroy();
  }, 30_000);

  test('a file as large as the setting goes through, a larger one hears Bittern’s own refusal', async () => {
    const stations = JSON.parse((await ask('GET', '/api/v1/networks/merrow/stations', signedIn())).text);
    const [{ code }] = stations.items;
    const send = (mebibytes: number) =>
      ask('POST', `/api/v1/networks/merrow/imports?station=${code}&name=card-${mebibytes}.csv`, {
        ...signedIn({ 'content-type': 'text/csv', origin: `https://${PROXY_NAME}` }),
        body: Buffer.alloc(mebibytes * 1024 * 1024, 'nothing that is a level;\n'),
      });
    const taken = await send(PROXIED_IMPORT_MIB - 1);
    expect(taken.status).toBe(201);
    const refused = await send(PROXIED_IMPORT_MIB + 2);
    expect([refused.status, refused.text]).toMatchObject([413, expect.stringContaining('"too-large"')]);
  }, 60_000);

  test('a browser signs in by the form and stays so', async () => {
    const browser = await chromium.launch({
      executablePath: '/usr/bin/chromium',
      args: [...CHROMIUM_FLAGS, `--host-resolver-rules=MAP ${PROXY_NAME}:443 127.0.0.1:${proxied.httpsPort}`],
    });
    try {
      const context = await browser.newContext({ ignoreHTTPSErrors: true, baseURL: `https://${PROXY_NAME}` });
      const page = await context.newPage();
      await page.goto('/n/merrow/limits');
      await page.getByLabel('E-mail').fill('operator@merrow.example');
      await page.getByLabel('Password').fill(inject('demoPassword'));
      await page.getByRole('button', { name: 'Sign in' }).click();
      await page.waitForURL('**/n/merrow/limits');
      const cookies = await context.cookies();
      expect(cookies.map(({ name }) => name)).toContain('__Host-bittern-session');
      const loose = cookies.filter(({ name, secure }) => !secure || !name.startsWith('__Host-'));
      expect(loose.map(({ name }) => name)).toEqual([]);
    } finally {
      await browser.close();
    }
  }, 60_000);

  test('a client that dribbles its body is let go, and others are served meanwhile', async () => {
    const socket = connect({
      port: proxied.httpsPort,
      servername: PROXY_NAME,
      ca: proxied.certificate,
      ALPNProtocols: ['http/1.1'],
    });
    await once(socket, 'secureConnect');
    socket.on('error', () => undefined);
    const closed = once(socket, 'close');
    socket.resume();
    const head = `POST /api/v1/intervals HTTP/1.1\r\nHost: ${PROXY_NAME}\r\nContent-Length: 100000\r\n`;
    socket.write(`${head}Content-Type: application/json\r\n\r\n`);
    const startedMs = Date.now();
    const dribble = setInterval(() => socket.write(' '), 500);
    try {
      expect((await ask('GET', '/healthz')).status).toBe(200);
      await closed;
      expect(Date.now() - startedMs).toBeLessThan(45_000);
    } finally {
      clearInterval(dribble);
      socket.destroy();
    }
  }, 60_000);

  test('with the web stopped, everybody hears when to come again', async () => {
    await proxied.stopWeb();
    const answer = await ask('POST', '/api/v1/intervals', { body: '{}' });
    expect(answer.status).toBe(503);
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
  });
});

async function textOf(answer: IncomingMessage): Promise<string> {
  const parts: Buffer[] = [];
  for await (const part of answer) parts.push(part as Buffer);
  return Buffer.concat(parts).toString();
}
