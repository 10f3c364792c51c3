import { afterEach, beforeAll, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';

process.env['BITTERN_POSTS_PER_MINUTE_TOKEN'] = '300';
process.env['BITTERN_POSTS_PER_MINUTE_ADDRESS'] = '1200';
const TOKEN_BURST = 50;
const ADDRESS_BURST = 200;

useFreshSchema();

let networkId: number;
let stations = 0;

beforeAll(async () => {
  networkId = await makeNetwork('quay');
});

afterEach(() => {
  vi.useRealTimers();
});

/** Stops the clock, so that a slow machine earns nothing while it posts. */
const stopClock = () => vi.useFakeTimers({ toFake: ['Date'] });

async function makeMonitor(): Promise<string> {
  stations += 1;
  const stationId = await makeStation(networkId, `QY-${stations}`);
  return inTransaction((transaction) => insertStationToken(stationId, null, transaction));
}

function post(token: string, clientAddress: string, minute = 0, count = 1): Promise<Response> {
  const intervals = Array.from({ length: count }, (_, at) => ({
    start: new Date(Date.UTC(2026, 2, 1, 0, minute + at)).toISOString(),
    seconds: 60,
    LAeq: 52.3,
  }));
  return callApi('POST', '/api/v1/intervals', { token, clientAddress, body: { bands: [], intervals } });
}

const statusesOf = async (posts: Promise<Response>[]) =>
  (await Promise.all(posts)).map(({ status }) => status);

test('of a token that floods, eight posts are under way; others are asked to wait, and another monitor is served', async () => {
  const [flooding, other] = [await makeMonitor(), await makeMonitor()];
  const flood = Array.from({ length: 30 }, (_, at) => post(flooding, '203.0.113.1', at * 100, 100));
  const served = post(other, '203.0.113.2');
  const statuses = await statusesOf(flood);
  expect((await served).status).toBe(200);
  expect(statuses.filter((status) => status === 200)).toHaveLength(8);
  const refused = (await Promise.all(flood)).find(({ status }) => status !== 200);
  expect(refused?.status).toBe(429);
  expect(Number(refused?.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(await refused?.json()).toMatchObject({ status: 429, code: 'too-many-at-once' });
  expect(await db()('interval_levels').count({ count: '*' }).first()).toEqual({ count: 801 });
});

test('above the pace of a token 429 says when to come again, whatever addresses it comes from', async () => {
  const [quick, other] = [await makeMonitor(), await makeMonitor()];
  stopClock();
  const statuses: number[] = [];
  for (let at = 0; at < TOKEN_BURST; at += 1) statuses.push((await post(quick, `198.51.100.${at}`)).status);
  expect(statuses).toEqual(Array(TOKEN_BURST).fill(200));
  const refused = await post(quick, '198.51.100.99');
  expect(refused.status).toBe(429);
  expect(refused.headers.get('retry-after')).toBe('1');
  expect(await refused.json()).toMatchObject({ code: 'too-many-of-token' });
  expect((await post(other, '198.51.100.1')).status).toBe(200);
});

test('above the pace of an address 429, invented tokens too; another address is served', async () => {
  const token = await makeMonitor();
  stopClock();
  const statuses: number[] = [];
  for (let at = 0; at < ADDRESS_BURST; at += 1) statuses.push((await post(`bs_${at}`, '203.0.113.7')).status);
  expect(new Set(statuses)).toEqual(new Set([401]));
  expect((await post(token, '203.0.113.7')).status).toBe(429);
  expect((await post(token, '203.0.113.8')).status).toBe(200);
});

test('posts of one address with invented tokens share one monitor’s turns', async () => {
  const token = await makeMonitor();
  const invented = Array.from({ length: 40 }, (_, at) => post(`bs_x${at}`, '203.0.113.20'));
  const served = post(token, '203.0.113.21');
  expect((await served).status).toBe(200);
  expect(new Set(await statusesOf(invented))).toEqual(new Set([401, 429]));
});
