import { beforeAll, describe, expect, test } from 'vitest';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import type { Hit } from '#lib/contracts/search';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makeStation } from '../support/people';
import { roleSessions, type Sessions, type Who } from '../stations/support';

useFreshSchema();

const WINDOW = { from: '2026-03-17T03:10:00Z', to: '2026-03-17T03:40:00Z' };
const LIMIT = {
  name: 'Quiet hours',
  metric: 'LAeq',
  window: '1h',
  threshold: 55,
  recipients: ['duty@limits.example'],
  reason: 'Permit, condition 4',
};
const COMPLAINT = {
  ...WINDOW,
  kind: 'hum',
  station: 'MER-01',
  contact: { name: 'Perpetua Wren', email: 'perpetua@people.example' },
};

let sessions: Sessions;
let reference: string;

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  sessions = await roleSessions(networkId, elsewhere);
  const stationId = await makeStation(networkId, 'MER-01', { name: 'Ropewalk School' });
  await makeStation(elsewhere, 'FAR-01', { name: 'Ropewalk Farther' });
  await postOneInterval(stationId);
  const limit = await callApi('POST', '/api/v1/networks/merrow/limits', {
    session: sessions.operator,
    body: LIMIT,
  });
  expect(limit.status, await limit.clone().text()).toBe(201);
  const complaint = await callApi('POST', '/api/v1/networks/merrow/complaints', {
    session: sessions.liaison,
    body: COMPLAINT,
  });
  expect(complaint.status, await complaint.clone().text()).toBe(201);
  ({ reference } = ((await complaint.json()) as { complaint: { reference: string } }).complaint);
});

async function postOneInterval(stationId: number): Promise<void> {
  const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
  const body = { bands: [], intervals: [{ start: WINDOW.from, seconds: 60, LAeq: 50 }] };
  const answer = await callApi('POST', '/api/v1/intervals', { token, body });
  expect(await answer.json()).toMatchObject({ accepted: 1 });
  await aggregateAll(() => Promise.resolve());
}

async function find(who: Who, q: string): Promise<Hit[]> {
  const path = `/api/v1/networks/merrow/search?${new URLSearchParams({ q }).toString()}`;
  const answer = await callApi('GET', path, { session: sessions[who] });
  expect(answer.status).toBe(200);
  return ((await answer.json()) as { items: Hit[] }).items;
}

const labels = (hits: Hit[]) => hits.map(({ label }) => label);

describe('what is found', () => {
  test('a station by name or code, of this network only', async () => {
    const hit = {
      kind: 'station',
      label: 'Ropewalk School',
      detail: 'MER-01',
      href: '/n/merrow/stations/MER-01',
    };
    expect(await find('regulator', 'rope')).toEqual([hit]);
    expect(await find('regulator', 'mer-01')).toContainEqual(hit);
    expect(await find('administrator', 'farther')).toEqual([]);
  });

  test('a limit by name, a month in words and digits', async () => {
    expect(await find('regulator', 'quiet')).toMatchObject([
      { kind: 'limit', label: 'Quiet hours', detail: 'LAeq,1 h above 55.0 dB' },
      { kind: 'page', label: 'Alerts' },
    ]);
    const month = { kind: 'month', label: 'March 2026', href: '/n/merrow/summaries/2026-03' };
    expect(await find('regulator', 'march')).toMatchObject([month]);
    expect(await find('regulator', '2026-03')).toMatchObject([month]);
  });

  test('a complaint by its reference, never by who complained', async () => {
    const hit = { kind: 'complaint', label: reference, href: `/n/merrow/complaints/${reference}` };
    expect(await find('regulator', reference.toLowerCase())).toMatchObject([hit]);
    expect(await find('liaison', 'Perpetua')).toEqual([]);
    expect(await find('liaison', 'perpetua@people.example')).toEqual([]);
  });

  test('pages as the roles open them', async () => {
    expect(labels(await find('operator', 'register station'))).toEqual(['Register a station']);
    expect(labels(await find('regulator', 'register station'))).toEqual([]);
    expect(labels(await find('liaison', 'log complaint'))).toEqual(['Log a complaint']);
    expect(labels(await find('operator', 'audit'))).toEqual([]);
    expect(labels(await find('administrator', 'audit'))).toEqual(['Audit trail']);
    expect(labels(await find('regulator', ''))).toEqual(expect.arrayContaining(['Map', 'Ropewalk School']));
  });

  test('signs of the query language are only letters that nothing holds', async () => {
    expect(await find('operator', '100%_"\\')).toEqual([]);
  });
});

test('nothing is found by who may not enter', async () => {
  const of = async (who: Who) =>
    (await callApi('GET', '/api/v1/networks/merrow/search?q=map', { session: sessions[who] })).status;
  expect(await of('nobody')).toBe(401);
  expect(await of('stranger')).toBe(404);
});
