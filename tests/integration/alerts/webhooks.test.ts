import { once } from 'node:events';
import { createServer, type IncomingHttpHeaders, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { isFromBittern } from '#components/alerts/receiverExample.js';
import { db } from '#db/client';
import { queueWebhooks } from '#ingest/notify/queueWebhooks';
import { sendDueWebhook } from '#ingest/notify/sendWebhooks';
import { config } from '#lib/config/index';
import { acknowledge } from '#lib/services/exceedances/acknowledge';
import {
  addWebhook,
  removeWebhook,
  retryWebhook,
  testWebhook,
  webhooksOf,
} from '#lib/services/webhooks/webhooks';
import { makeLimit } from '../exceedances/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { findAndTell, outbox } from './support';

useFreshSchema();

const MINUTE_MS = 60_000;
let networks = 0;
let networkId: number;
let stationId: number;
let userId: string;
let limit: Awaited<ReturnType<typeof makeLimit>>;
let receiver: Server;
let url: string;
let status: number;
let got: { headers: IncomingHttpHeaders; body: string }[];

beforeEach(async () => {
  networks += 1;
  config().webhooksMayLoopBack = true;
  await db()('webhooks').delete();
  await db()('webhook_deliveries').delete();
  await db()('outbox').delete();
  networkId = await makeNetwork(`hooks-${networks}`);
  stationId = await makeStation(networkId, 'WH-1');
  limit = await makeLimit(networkId, 'Quay');
  userId = (await makePerson(networkId, ['operator'])).userId;
  got = [];
  status = 204;
  receiver = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      got.push({ headers: request.headers, body: Buffer.concat(chunks).toString() });
      response.writeHead(status, { Location: `${url}/elsewhere` }).end();
    });
  });
  receiver.listen(0, '127.0.0.1');
  await once(receiver, 'listening');
  url = `http://127.0.0.1:${(receiver.address() as AddressInfo).port}/noise`;
});

afterEach(() => {
  config().webhooksMayLoopBack = false;
  receiver.close();
});

const actor = () => ({ networkId, userId });
/** Each a second later than the one before, so that it has a window of its own. */
let findings = 0;
const found = () => {
  findings += 1;
  const now = new Date(Date.now() + findings * 1000);
  return findAndTell({ networkId, stationId, limit, now, levelDb: 57.4 }, queueWebhooks);
};
const add = async () => {
  const outcome = await addWebhook(actor(), url);
  if (outcome.kind !== 'done') throw new Error('The webhook was refused.');
  return outcome.value.secret;
};
const sendAll = async (afterMs = 0, holder = 'one') => {
  const now = new Date(Date.now() + 1000 + afterMs);
  while ((await sendDueWebhook({ holder, mayLoopBack: true, random: () => 0.5 }, now)) > 0);
};
const idOf = async () => (await webhooksOf(networkId)).webhooks[0]?.id ?? 0;

test('an exceedance is posted once, signed, to the webhooks of its network only', async () => {
  const secret = await add();
  await found();
  await found();
  await Promise.all([sendAll(0, 'a'), sendAll(0, 'b'), sendAll(0, 'c')]);
  expect(got).toHaveLength(2);
  const [first] = got;
  expect(isFromBittern(first?.headers, first?.body, url, secret)).toBe(true);
  const id = (await idOf()).toString();
  expect(first?.headers['signature-input']).toContain(`keyid="webhook-${id}"`);
  expect(Object.keys(first?.headers ?? {}).filter((name) => name.startsWith('bittern'))).toEqual([]);
  const told = JSON.parse(first?.body ?? '{}') as { id: string; event: string; exceedance: object };
  expect(told).toMatchObject({
    event: 'exceedance.found',
    network: `hooks-${networks}`,
    exceedance: { station: 'WH-1', level: 57.4, threshold: 55, isAcknowledged: false, coverage: 0.98 },
  });
  expect((await webhooksOf(networkId)).deliveries.map(({ eventId }) => eventId)).toContain(told.id);
  expect((await webhooksOf(networkId)).deliveries).toMatchObject([
    { state: 'delivered' },
    { state: 'delivered' },
  ]);
  expect(JSON.stringify(await db()('webhooks'))).not.toContain(secret);
});

test('the first acknowledgement is posted, without who it was and what was noted', async () => {
  await add();
  const id = await found();
  for (const note of ['Rang the quay.', 'Rang again.']) {
    const given = { note, cause: null, causeDetail: null, version: null };
    await acknowledge({ networkId, id, userId, given });
  }
  await sendAll();
  const events = got.map(({ body }) => JSON.parse(body) as { event: string; exceedance: object });
  expect(events.map(({ event }) => event)).toEqual(['exceedance.found', 'exceedance.acknowledged']);
  expect(events[1]).toMatchObject({ exceedance: { id, isAcknowledged: true } });
  expect(got[1]?.body).not.toContain('Rang');
});

test('a receiver that fails is left in peace ever longer and gets everything once when it is back', async () => {
  await add();
  await found();
  await found();
  status = 500;
  await sendAll();
  expect(got).toHaveLength(1);
  await sendAll(0.9 * MINUTE_MS);
  expect(got).toHaveLength(1);
  await sendAll(1.1 * MINUTE_MS);
  await sendAll(2 * MINUTE_MS);
  expect(got).toHaveLength(2);
  status = 200;
  got = [];
  await sendAll(60 * MINUTE_MS);
  await sendAll(120 * MINUTE_MS);
  expect(got).toHaveLength(2);
});

test('a redirect is a failure and is not followed', async () => {
  await add();
  await found();
  status = 302;
  await sendAll();
  expect(got).toHaveLength(1);
  expect((await webhooksOf(networkId)).deliveries).toMatchObject([
    { state: 'waiting', lastOutcome: 'answered 302' },
  ]);
});

test('after three days of failing, or at 410, it is given up; operators are told, and a person has it tried again', async () => {
  await add();
  await found();
  status = 500;
  await sendAll();
  await sendAll(25 * 60 * MINUTE_MS);
  expect((await webhooksOf(networkId)).deliveries).toMatchObject([{ state: 'dead' }]);
  expect((await webhooksOf(networkId)).webhooks[0]?.disabledAt).toBeNull();
  await found();
  await sendAll(73 * 60 * MINUTE_MS);
  expect((await webhooksOf(networkId)).webhooks[0]?.disabledReason).toBe('answered 500');
  expect(await outbox()).toMatchObject([{ kind: 'webhook' }]);
  got = [];
  await testWebhook(actor(), await idOf());
  await sendAll(100 * 60 * MINUTE_MS);
  expect(got).toHaveLength(0);
  status = 200;
  await retryWebhook(actor(), await idOf());
  await sendAll();
  expect(got.map(({ body }) => (JSON.parse(body) as { event: string }).event)).toEqual(['test']);
  status = 410;
  await testWebhook(actor(), await idOf());
  await sendAll();
  expect((await webhooksOf(networkId)).webhooks[0]?.disabledAt).not.toBeNull();
});

test('only public https is taken; another network’s webhook is not there; what is ended is posted nothing', async () => {
  config().webhooksMayLoopBack = false;
  for (const wrong of [url, 'https://10.0.0.1/', 'https://localhost/', 'nonsense', '']) {
    expect(await addWebhook(actor(), wrong), wrong).toMatchObject({ kind: 'invalid' });
  }
  config().webhooksMayLoopBack = true;
  await add();
  expect(await addWebhook(actor(), url)).toMatchObject({ kind: 'invalid' });
  const foreign = { networkId: await makeNetwork(`far-${networks}`), userId };
  for (const act of [removeWebhook, retryWebhook, testWebhook]) {
    expect((await act(foreign, await idOf())).kind).toBe('unknown');
  }
  await found();
  await removeWebhook(actor(), await idOf());
  await sendAll();
  expect(got).toHaveLength(0);
  const acts = (await db()('audit_log').where({ network_id: networkId }).pluck('action')) as string[];
  expect(acts).toEqual(['webhook.add', 'webhook.end']);
});

test('a webhook added while loopback was allowed is not posted to when it is not', async () => {
  await add();
  await found();
  await sendDueWebhook({ holder: 'one', mayLoopBack: false }, new Date(Date.now() + 1000));
  expect(got).toHaveLength(0);
  expect((await webhooksOf(networkId)).deliveries[0]?.lastOutcome).toContain('Not sent');
});
