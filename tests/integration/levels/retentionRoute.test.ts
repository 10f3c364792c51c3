import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { sec } from './support/desk';

/** For how long single intervals are kept, by the interface. */
useFreshSchema();

const PATH = '/api/v1/networks/keeps/retention';

let networkId: number;
let administrator: string;
let operator: string;

beforeAll(async () => {
  networkId = await makeNetwork('keeps');
  ({ session: administrator } = await makePerson(null, [], true));
  ({ session: operator } = await makePerson(networkId, ['operator']));
});

const put = (body: unknown, session: string) => callApi('PUT', PATH, { session, body });
const current = async () => (await callApi('GET', PATH, { session: operator })).json();

test('a network keeps everything until an administrator says that the rest may be deleted', async () => {
  const forGood = { keepMonths: null, sealedBefore: null, keptFrom: null };
  expect(await current()).toEqual(forGood);
  expect((await put({ keepMonths: 24, deletes: true }, operator)).status).toBe(403);
  for (const body of [
    {},
    { keepMonths: 24 },
    { keepMonths: 12, deletes: true },
    { keepMonths: 24, deletes: false },
  ])
    expect((await put(body, administrator)).status, JSON.stringify(body)).toBe(422);
  expect(await current()).toEqual(forGood);
  const answer = await put({ keepMonths: 24, deletes: true }, administrator);
  expect(answer.status).toBe(200);
  expect(await answer.json()).toEqual({ ...forGood, keepMonths: 24 });
  expect(await db()('audit_log').where({ action: 'network.retention', network_id: networkId })).toHaveLength(
    1,
  );
});

test('it tells how far it has come, and keeping for good needs no word about deleting', async () => {
  await db()('sealed_stations').insert({
    station_id: await makeStation(networkId, 'K-1'),
    sealed_before: sec('2025-03-01T00:00:00Z'),
    kept_from: sec('2025-02-27T00:00:00Z'),
    sealed_at: new Date(),
  });
  expect((await put({ keepMonths: null }, administrator)).status).toBe(200);
  expect(await current()).toEqual({
    keepMonths: null,
    sealedBefore: '2025-03-01T00:00:00Z',
    keptFrom: '2025-02-27T00:00:00Z',
  });
});
