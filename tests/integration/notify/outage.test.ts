import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import type { SMTPServer } from 'smtp-server';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { makeTransport } from '#ingest/notify/transport';
import { mailPage, retryMail } from '#lib/services/mails/outbox';
import { smtpServer, type Behaviour } from '#ops/standins/mail/smtp';
import { MailStore } from '#ops/standins/mail/store';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';

/** Messages by real SMTP to the stand-in, which breaks as mail servers do. */
useFreshSchema();

const MINUTE_MS = 60_000;
let directory: string;
let store: MailStore;
let server: SMTPServer | null;
let behaviour: Behaviour;

beforeEach(async () => {
  await db()('outbox').delete();
  directory = mkdtempSync(join(tmpdir(), 'bittern-mail-'));
  store = new MailStore(directory);
  behaviour = 'normal';
  server = null;
});

afterEach(async () => {
  await stop();
  rmSync(directory, { recursive: true });
});

/** Begins to take mail; answers the port. */
async function start(port = 0): Promise<number> {
  const begun = smtpServer(store, () => behaviour);
  begun.on('error', () => undefined);
  await new Promise<void>((resolve) => begun.listen(port, '127.0.0.1', resolve));
  server = begun;
  return (begun.server.address() as AddressInfo).port;
}

async function stop(): Promise<void> {
  const ended = server;
  server = null;
  if (ended) await new Promise<void>((resolve) => ended.close(resolve));
}

function sender(port: number, holder = 'one') {
  const smtp = { host: '127.0.0.1', port, isSecure: false, user: null, password: null, from: '' };
  return { transport: makeTransport({ smtp }), from: 'bittern@merrow.example', holder, resolvers: {} };
}

async function put(key: string, networkId = 1): Promise<void> {
  const mail = { messageId: messageIdOf(key), dedupeKey: key, networkId, kind: 'exceedances' };
  const content = { subject: key, text: 'text', html: '<p>html</p>' };
  await inTransaction((transaction) =>
    insertMail({ ...mail, ...content, recipient: `${key}@people.example` }, transaction),
  );
}

async function sendAllDue(settings: ReturnType<typeof sender>, now: Date): Promise<void> {
  while ((await sendDueMail(settings, now)) > 0);
}

const received = () => store.list().map(({ parsed }) => parsed.messageId);

test('the mail server is away for an hour, then refuses, then is back: every message arrives once', async () => {
  const port = await start();
  await stop();
  const keys = Array.from({ length: 12 }, (_, n) => `m${n}`);
  for (const key of keys) await put(key);
  const two = [sender(port, 'one'), sender(port, 'two')];
  const begun = Date.now();
  const passMinute = (minute: number) =>
    Promise.all(two.map((one) => sendAllDue(one, new Date(begun + 2000 + minute * MINUTE_MS))));
  for (let minute = 0; minute < 60; minute += 1) await passMinute(minute);
  expect(received()).toEqual([]);
  const attempts = (await db()('outbox').pluck('attempts')) as number[];
  expect(Math.max(...attempts)).toBeLessThanOrEqual(8);

  await start(port);
  behaviour = 'refuse';
  for (let minute = 60; minute < 70; minute += 1) await passMinute(minute);
  behaviour = 'normal';
  // The longest wait and a fifth: nothing is put off beyond it.
  for (let minute = 70; minute < 145; minute += 1) await passMinute(minute);
  expect(received().sort()).toEqual(keys.map(messageIdOf).sort());
  expect(new Set(await db()('outbox').pluck('state'))).toEqual(new Set(['sent']));
});

test('a sender killed after handing over and before noting it: one repeat at most, same Message-ID', async () => {
  const port = await start();
  await put('k');
  behaviour = 'slow';
  const child = spawn('npx', ['tsx', 'tests/integration/notify/senderProcess.ts'], {
    env: { ...process.env, BITTERN_SMTP_PORT: String(port), BITTERN_LOG_LEVEL: 'silent' },
    stdio: 'ignore',
    detached: true,
  });
  const ended = once(child, 'exit');
  for (let wait = 0; wait < 400 && received().length === 0; wait += 1) await sleep(50);
  process.kill(-(child.pid ?? 0), 'SIGKILL');
  await ended;
  expect(await db()('outbox').first('state', 'attempts')).toMatchObject({ state: 'waiting', attempts: 0 });

  behaviour = 'normal';
  await sendAllDue(sender(port), new Date());
  expect(received()).toHaveLength(1);
  await sendAllDue(sender(port), new Date(Date.now() + 3 * MINUTE_MS));
  await sendAllDue(sender(port), new Date(Date.now() + 60 * MINUTE_MS));
  expect(received()).toEqual([messageIdOf('k'), messageIdOf('k')]);
});

test('a message that was given up is seen by its network only, and is sent when a person has it tried again', async () => {
  const networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  const { userId } = await makePerson(networkId, ['operator']);
  await put('dead', networkId);
  await put('foreign', elsewhere);
  await db()('outbox').update({ state: 'dead', attempts: 120, last_error: '550 no such box' });
  const { counts, mails } = await mailPage(networkId, 'dead', null, new Date());
  expect(counts).toEqual({ dead: 1, waiting: 0, sent: 0 });
  expect(mails).toMatchObject([{ recipient: 'dead@people.example', lastError: '550 no such box' }]);

  const who = { networkId, userId };
  const foreignId = (await db()('outbox').where({ network_id: elsewhere }).first('id')).id as number;
  expect((await retryMail(who, foreignId, new Date())).kind).toBe('unknown');
  expect(await retryMail(who, null, new Date())).toEqual({ kind: 'done', value: 1 });
  await sendAllDue(sender(await start()), new Date());
  expect(received()).toEqual([messageIdOf('dead')]);
  expect((await retryMail(who, mails[0]?.id ?? 0, new Date())).kind).toBe('unknown');
  const audit = await db()('audit_log').where({ action: 'mail.resend' });
  expect(audit).toMatchObject([{ network_id: networkId, user_id: userId }]);
});
