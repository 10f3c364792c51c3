import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { config } from '#lib/config/index';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const BASE = '/api/v1/networks/alert-api';
let operator: string;
let regulator: string;

beforeAll(async () => {
  const networkId = await makeNetwork('alert-api');
  await makeStation(networkId, 'AA-1');
  ({ session: operator } = await makePerson(networkId, ['operator']));
  ({ session: regulator } = await makePerson(networkId, ['regulator']));
});

const PREFERENCES = {
  delivery: 'daily',
  dailyAt: '06:30',
  groupMinutes: 15,
  quietFrom: '22:00',
  quietTo: '06:00',
  override: 6.5,
  stations: ['AA-1'],
  warnsEarly: true,
};

test('everybody reads and sets how they themselves are told', async () => {
  const path = `${BASE}/alert-preferences`;
  const before = await (await callApi('GET', path, { session: regulator })).json();
  expect(before).toEqual({
    preferences: {
      delivery: 'at-once',
      dailyAt: '07:00',
      groupMinutes: 5,
      quietFrom: null,
      quietTo: null,
      override: null,
      stations: null,
      warnsEarly: false,
    },
    namingLimits: [],
  });
  const set = await callApi('PUT', path, { session: regulator, body: PREFERENCES });
  expect(await set.json()).toEqual({ preferences: PREFERENCES, namingLimits: [] });
  expect(await (await callApi('GET', path, { session: regulator })).json()).toMatchObject({
    preferences: PREFERENCES,
  });
  expect(await (await callApi('GET', path, { session: operator })).json()).toEqual(before);
  const refused = await callApi('PUT', path, { session: regulator, body: { ...PREFERENCES, quietTo: null } });
  expect(refused.status).toBe(422);
  const foreign = { ...PREFERENCES, stations: ['AA-9'] };
  expect(await (await callApi('PUT', path, { session: regulator, body: foreign })).json()).toMatchObject({
    fields: [{ field: 'stations' }],
  });
});

test('operators add, test, retry and end webhooks; the secret is told once; nobody else sees them', async () => {
  const path = `${BASE}/webhooks`;
  const post = (of: string, body?: object, session = operator) => callApi('POST', of, { session, body });
  config().webhooksMayLoopBack = true;
  const url = 'http://127.0.0.1:9/noise';
  const added = await post(path, { url });
  expect(added.status).toBe(201);
  const { webhook, secret } = await added.json();
  expect(webhook).toMatchObject({ url, state: 'working', failures: 0 });
  expect(secret.length).toBeGreaterThan(20);
  expect((await post(path, { url })).status).toBe(422);
  expect((await post(path, { url: 'ftp://elsewhere.example' })).status).toBe(422);
  expect((await post(`${path}/${webhook.id}/test`, {})).status).toBe(204);
  await db()('webhooks').update({ failures: 3, disabled_at: new Date(), disabled_reason: 'Gone' });
  const listed = async () => (await callApi('GET', path, { session: operator })).text();
  expect(JSON.parse(await listed())).toMatchObject({
    items: [{ id: webhook.id, state: 'given-up', problem: 'Gone' }],
    deliveries: [{ webhook: webhook.id, event: 'test', state: 'waiting', attempts: 0 }],
  });
  expect(await listed()).not.toContain(secret);
  expect((await post(`${path}/${webhook.id}/retry`, {})).status).toBe(204);
  expect(JSON.parse(await listed())).toMatchObject({ items: [{ state: 'working' }] });
  for (const act of ['test', 'retry', 'end']) {
    expect((await post(`${path}/${webhook.id}/${act}`, {}, regulator)).status, act).toBe(403);
  }
  expect((await callApi('GET', path, { session: regulator })).status).toBe(403);
  expect((await post(`${path}/${webhook.id}/end`, {})).status).toBe(204);
  expect(JSON.parse(await listed())).toMatchObject({ items: [] });
  expect((await post(`${path}/${webhook.id}/end`, {})).status).toBe(404);
});
