import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { createTransport, type SendMailOptions } from 'nodemailer';
import type { SMTPServer } from 'smtp-server';
import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { mailboxApp, type MailControl } from '#ops/standins/mail/app';
import { smtpServer } from '#ops/standins/mail/smtp';
import { MailStore } from '#ops/standins/mail/store';

let directory: string;
let store: MailStore;
let smtp: SMTPServer;
let web: Server;
let control: MailControl;

beforeEach(async () => {
  directory = mkdtempSync(join(tmpdir(), 'bittern-mail-'));
  store = new MailStore(directory);
  control = { behaviour: 'normal' };
  smtp = smtpServer(store, () => control.behaviour);
  smtp.on('error', () => undefined);
  web = createServer(mailboxApp(store, control));
  await new Promise<void>((listening) => smtp.listen(0, '127.0.0.1', listening));
  await new Promise<void>((listening) => web.listen(0, '127.0.0.1', listening));
});

afterEach(async () => {
  await new Promise<void>((closed) => smtp.close(closed));
  web.closeAllConnections();
  await new Promise((closed) => web.close(closed));
  rmSync(directory, { recursive: true });
});

const portOf = (server: { address(): unknown }) => (server.address() as AddressInfo).port;
const get = (path: string) => fetch(`http://127.0.0.1:${portOf(web)}${path}`);

function send(mail: SendMailOptions = {}): Promise<unknown> {
  const transport = createTransport({ host: '127.0.0.1', port: portOf(smtp.server), secure: false });
  return transport.sendMail({
    from: 'bittern@merrow.example',
    to: 'operator@merrow.example',
    subject: 'Quay Head: above the limit by 2.3 dB',
    text: 'L & <b>',
    html: '<p>Level <b>57.3 dB</b></p>',
    messageId: '<one@merrow.example>',
    ...mail,
  });
}

test('a message is shown with its parts, and found by recipient', async () => {
  await send();
  const listed = (await (await get('/api/messages?to=operator@')).json()) as {
    id: string;
    messageId: string;
  }[];
  expect(listed).toMatchObject([
    { messageId: '<one@merrow.example>', subject: 'Quay Head: above the limit by 2.3 dB' },
  ]);
  expect(await (await get('/api/messages?to=nobody@')).json()).toEqual([]);
  const page = await (await get(`/messages/${listed[0]?.id}`)).text();
  expect(page).toContain('L &amp; &lt;b&gt;');
  const html = await get(`/messages/${listed[0]?.id}/html`);
  expect(html.headers.get('content-security-policy')).toContain('sandbox');
  expect(await html.text()).toContain('<b>57.3 dB</b>');
});

test('what was received is there after a restart', async () => {
  await send();
  const again = new MailStore(directory);
  await again.load();
  expect(again.list().map(({ parsed, recipients }) => [parsed.messageId, recipients])).toEqual([
    ['<one@merrow.example>', ['operator@merrow.example']],
  ]);
});

test('markup in a subject is shown, not run', async () => {
  await send({ subject: '<img src=x onerror=alert(1)>' });
  const page = await (await get('/')).text();
  expect(page).toContain('&lt;img src=x');
  expect(page).not.toContain('<img');
});

test('script in a message cannot run or fetch: its frame is sandboxed and its address allows nothing', async () => {
  await send({ html: '<script>alert(1)</script><img src="https://spy.example/x.gif">' });
  const [mail] = store.list();
  const page = await (await get(`/messages/${mail?.id}`)).text();
  expect(page).toContain(`<iframe sandbox title="Message as HTML" src="/messages/${mail?.id}/html">`);
  expect(page).not.toContain('<script');
  const policy = (await get(`/messages/${mail?.id}/html`)).headers.get('content-security-policy');
  expect(policy?.split('; ')).toEqual([
    "default-src 'none'",
    "style-src 'unsafe-inline'",
    'img-src data:',
    'sandbox',
  ]);
});

test('an attachment is saved as it was sent, never shown', async () => {
  await send({ attachments: [{ filename: 'evidence.html', content: '<p>57.3 dB</p>' }] });
  const [mail] = store.list();
  const saved = await get(`/messages/${mail?.id}/attachments/0`);
  expect(saved.headers.get('content-type')).toBe('application/octet-stream');
  expect(saved.headers.get('content-disposition')).toBe('attachment; filename=evidence.html');
  expect(await saved.text()).toBe('<p>57.3 dB</p>');
  expect((await get(`/messages/${mail?.id}/attachments/1`)).status).toBe(404);
});

test('messages are listed newest first, found by subject, and can all be removed', async () => {
  await send({ subject: 'Station silent since 03:15' });
  await send({ subject: 'Station answers again', messageId: '<two@merrow.example>' });
  const subjects = async (query: string) =>
    ((await (await get(`/api/messages?${query}`)).json()) as { subject: string }[]).map(
      ({ subject }) => subject,
    );
  expect(await subjects('')).toEqual(['Station answers again', 'Station silent since 03:15']);
  expect(await subjects('subject=SILENT')).toEqual(['Station silent since 03:15']);
  const removal = await fetch(`http://127.0.0.1:${portOf(web)}/api/messages`, { method: 'DELETE' });
  expect(removal.status).toBe(204);
  expect(await subjects('')).toEqual([]);
  expect(readdirSync(directory)).toEqual([]);
});

function behave(mode: string): Promise<Response> {
  return fetch(`http://127.0.0.1:${portOf(web)}/api/behaviour`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ mode }),
  });
}

test('slow: the message is kept at once, the answer lets wait', async () => {
  await behave('slow');
  let isAnswered = false;
  const sent = send().then(
    () => (isAnswered = true),
    () => undefined,
  );
  await vi.waitFor(() => expect(store.list()).toHaveLength(1), { timeout: 5000 });
  await sleep(500);
  expect(isAnswered).toBe(false);
  await new Promise<void>((closed) => smtp.close(closed));
  await sent;
  expect(isAnswered).toBe(false);
});

test('it can refuse, and drop the line after it has taken a message', async () => {
  expect((await behave('odd')).status).toBe(422);
  await behave('refuse');
  await expect(send()).rejects.toThrow(/451/);
  expect(store.list()).toHaveLength(0);
  await behave('drop-after-data');
  await expect(send()).rejects.toThrow(/closed/i);
  expect(store.list()).toHaveLength(1);
  await behave('normal');
  await send();
  expect(store.list()).toHaveLength(2);
});
