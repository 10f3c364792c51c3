import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { SMTPServer } from 'smtp-server';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { makeTransport } from '#ingest/notify/transport';
import { smtpServer, type Behaviour } from '#ops/standins/mail/smtp';
import { MailStore } from '#ops/standins/mail/store';
import { useFreshSchema } from '../integration/support/freshSchema';

/** Messages by real SMTP to a server that breaks. How it is refused or away for hours: tests/integration/notify/outage.test.ts. */
useFreshSchema();

const MINUTE_MS = 60_000;
const DAY_MS = 86_400_000;
let directory: string;
let store: MailStore;
let server: SMTPServer;
let behaviour: Behaviour;
let port: number;

beforeEach(async () => {
  await db()('outbox').delete();
  directory = mkdtempSync(join(tmpdir(), 'bittern-faults-mail-'));
  store = new MailStore(directory);
  behaviour = 'normal';
  server = smtpServer(store, () => behaviour);
  server.on('error', () => undefined);
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  port = (server.server.address() as AddressInfo).port;
});

afterEach(async () => {
  await new Promise<void>((closed) => server.close(closed));
  rmSync(directory, { recursive: true });
});

function sender() {
  const smtp = { host: '127.0.0.1', port, isSecure: false, user: null, password: null, from: '' };
  return { transport: makeTransport({ smtp }), from: 'bittern@merrow.example', holder: 'one', resolvers: {} };
}

async function put(key: string): Promise<void> {
  const mail = { messageId: messageIdOf(key), dedupeKey: key, networkId: 1, kind: 'exceedances' };
  const content = { subject: key, text: 'text', html: '<p>html</p>', recipient: `${key}@people.example` };
  await inTransaction((transaction) => insertMail({ ...mail, ...content }, transaction));
}

async function sendAllDue(now: Date): Promise<void> {
  const settings = sender();
  while ((await sendDueMail(settings, now)) > 0);
}

const received = () => store.list().map(({ parsed }) => parsed.messageId);

test('the line dies after DATA: the message comes at most once more, under the same Message-ID', async () => {
  await put('k');
  behaviour = 'drop-after-data';
  await sendAllDue(new Date());
  expect(received()).toHaveLength(1);
  expect(await db()('outbox').first('state', 'attempts')).toMatchObject({ state: 'waiting', attempts: 1 });
  behaviour = 'normal';
  for (const minutes of [1.5, 3, 10, 100]) await sendAllDue(new Date(Date.now() + minutes * MINUTE_MS));
  expect(received()).toEqual([messageIdOf('k'), messageIdOf('k')]);
  expect(await db()('outbox').first('state')).toEqual({ state: 'sent' });
});

test('a slow server holds up the messages behind, and none comes twice', async () => {
  for (const key of ['a', 'b']) await put(key);
  behaviour = 'slow';
  await Promise.all([sendAllDue(new Date()), sendAllDue(new Date())]);
  expect(received().sort()).toEqual(['a', 'b'].map(messageIdOf).sort());
});

test('a clock that was ahead for a day puts no message off: neither its next attempt nor its lease', async () => {
  await put('early');
  const ahead = new Date(Date.now() + DAY_MS);
  behaviour = 'refuse';
  await sendDueMail(sender(), ahead);
  behaviour = 'normal';
  await put('leased');
  await db()('outbox').where({ dedupe_key: 'leased' }).update({ leased_until: ahead, lease_holder: 'dead' });
  await sendAllDue(new Date(Date.now() + 5 * MINUTE_MS));
  expect(received().sort()).toEqual(['early', 'leased'].map(messageIdOf).sort());
});
