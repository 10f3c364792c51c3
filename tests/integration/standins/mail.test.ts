import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createTransport, type SendMailOptions } from 'nodemailer';
import type { SMTPServer } from 'smtp-server';
import { afterEach, beforeEach, expect, test } from 'vitest';
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

test('it can refuse, and drop the line after it has taken a message', async () => {
  const behave = (mode: string) =>
    fetch(`http://127.0.0.1:${portOf(web)}/api/behaviour`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ mode }),
    });
  expect((await behave('odd')).status).toBe(422);
  await behave('refuse');
  await expect(send()).rejects.toThrow(/451/);
  expect(store.list()).toHaveLength(0);
  await behave('drop-after-data');
  await expect(send()).rejects.toThrow();
  expect(store.list()).toHaveLength(1);
  await behave('normal');
  await send();
  expect(store.list()).toHaveLength(2);
});
