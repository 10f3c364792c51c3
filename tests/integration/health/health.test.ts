import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { aggregateMarks } from '#ingest/aggregate/aggregate';
import { watchStations } from '#ingest/health/watch';
import { coverageDays } from '#lib/services/health/coverage';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { at, storeMinutes } from '../complaints/support';

useFreshSchema();

const base = '/api/v1/networks/reeds/health';
let networkId: number;
let operator: { session: string };
let regulator: { session: string };

beforeAll(async () => {
  networkId = await makeNetwork('reeds');
  operator = { session: (await makePerson(networkId, ['operator'])).session };
  regulator = { session: (await makePerson(networkId, ['regulator'])).session };
});

beforeEach(async () => {
  await db()('outbox').delete();
});

/** Minutes of changing levels, as posted each when it ended; the aggregates follow. */
async function post(stationId: number, from: string, to: string, batteryV = 12.4): Promise<void> {
  const [fromSec, toSec] = [at(from), at(to)];
  await storeMinutes(stationId, fromSec, toSec, (startSec) => {
    const level = 4500 + ((startSec / 60) % 700);
    return { laeqCentiDb: level, bandCentiDb: () => level - 1200 };
  });
  await db()('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .update({
      battery_centi_v: Math.round(batteryV * 100),
      wind_speed_centi_ms: db().raw('starts_at DIV 60 % 400'),
    });
  await db()('station_latest')
    .insert({
      station_id: stationId,
      starts_at: toSec - 60,
      duration_sec: 60,
      laeq_centi_db: 4500,
      flags: 0,
      battery_centi_v: Math.round(batteryV * 100),
      received_at: new Date(toSec * 1000),
    })
    .onConflict('station_id')
    .merge();
  for (let done = 1; done > 0;) done = (await aggregateMarks(async () => undefined)).quarters;
}

const watchAt = (instant: string) => watchStations(new Date(instant));
const subjects = async () => db()('outbox').orderBy('id').pluck('subject');

describe('troubles', () => {
  test('a silence is told once when it begins and once when it is over, however often it is looked for', async () => {
    const stationId = await makeStation(networkId, 'HL-1');
    await post(stationId, '2026-05-01T00:00:00Z', '2026-05-02T03:15:00Z');
    await watchAt('2026-05-02T03:16:00Z');
    expect(await subjects()).toEqual([]);
    await Promise.all([watchAt('2026-05-02T03:31:00Z'), watchAt('2026-05-02T03:31:00Z')]);
    await watchAt('2026-05-02T04:00:00Z');
    expect(await subjects()).toEqual(['HL-1 Station HL-1: Silent: no data come']);
    const health = await (await callApi('GET', base, regulator)).json();
    expect(health.troubles).toMatchObject([
      { station: 'HL-1', kind: 'silent', since: '2026-05-02T03:15:00Z', until: null },
    ]);
    await post(stationId, '2026-05-02T03:15:00Z', '2026-05-02T04:05:00Z');
    await watchAt('2026-05-02T04:06:00Z');
    expect(await subjects()).toHaveLength(1);
    await post(stationId, '2026-05-02T04:05:00Z', '2026-05-02T04:17:00Z');
    await watchAt('2026-05-02T04:17:00Z');
    await watchAt('2026-05-02T04:18:00Z');
    expect(await subjects()).toEqual([
      'HL-1 Station HL-1: Silent: no data come',
      'HL-1 Station HL-1: over: Silent: no data come',
    ]);
    const { items } = await (await callApi('GET', `${base}/troubles?station=HL-1`, operator)).json();
    expect(items).toMatchObject([{ since: '2026-05-02T03:15:00Z', until: '2026-05-02T04:06:00Z' }]);
  });

  test('bounds are those of the network, or of the station where it has its own', async () => {
    await db()('stations').update({ retired_at: new Date() });
    const ids = [await makeStation(networkId, 'HL-2'), await makeStation(networkId, 'HL-3')];
    const network = { thresholds: { leastBattery: 11 }, recipients: ['watch@merrow.example'] };
    expect((await callApi('PUT', `${base}/settings`, { ...regulator, body: network })).status).toBe(403);
    expect((await callApi('PUT', `${base}/settings`, { ...operator, body: network })).status).toBe(200);
    const own = { station: 'HL-3', thresholds: { leastBattery: 12 } };
    expect((await callApi('PUT', `${base}/settings`, { ...operator, body: own })).status).toBe(200);
    const wrong = { thresholds: { leastCoverage: 90 } };
    expect((await callApi('PUT', `${base}/settings`, { ...operator, body: wrong })).status).toBe(422);
    for (const id of ids) await post(id, '2026-05-10T00:00:00Z', '2026-05-11T00:00:00Z', 11.5);
    await watchAt('2026-05-11T00:01:00Z');
    expect(await db()('outbox').select('recipient', 'subject')).toEqual([
      {
        recipient: 'watch@merrow.example',
        subject: 'HL-3 Station HL-3: Battery at 11.5 V, less than 12.0 V',
      },
    ]);
  });

  test('a retired station’s troubles end without a word', async () => {
    await db()('stations').where({ code: 'HL-3' }).update({ retired_at: new Date() });
    await watchAt('2026-05-11T00:02:00Z');
    expect(await subjects()).toEqual([]);
    expect(await db()('health_troubles').where({ is_open: 1 })).toEqual([]);
  });

  test('a monitor’s clock is noted from the time that it sends', async () => {
    const stationId = await makeStation(networkId, 'HL-4');
    const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
    const nowSec = Math.floor(Date.now() / 1000);
    for (const minute of [3, 2]) {
      const start = new Date((Math.floor(nowSec / 60) - minute) * 60_000).toISOString();
      const sentAt = new Date((nowSec - 600) * 1000).toISOString();
      const body = { sentAt, bands: [], intervals: [{ start, seconds: 60, LAeq: 50 + minute }] };
      expect((await callApi('POST', '/api/v1/intervals', { token, body })).status).toBe(200);
    }
    const health = await (await callApi('GET', base, operator)).json();
    const clock = health.stations.find(({ station }: { station: string }) => station === 'HL-4').clockAhead;
    expect(clock).toBeLessThan(-595);
    expect(clock).toBeGreaterThan(-640);
    await watchStations(new Date());
    const kinds = await db()('health_troubles').where({ station_id: stationId }).pluck('kind');
    expect(kinds).toEqual(['clock']);
  });
});

describe('coverage by day', () => {
  test('counts the seconds that a day has, across clock changes and gaps', async () => {
    const stationId = await makeStation(networkId, 'HL-5');
    // Europe/London: 25 hours on 25 October 2026, 23 hours on 29 March.
    await post(stationId, '2026-03-28T12:00:00Z', '2026-03-29T23:00:00Z');
    await post(stationId, '2026-10-24T23:00:00Z', '2026-10-26T00:00:00Z');
    const days = async (from: string, to: string) =>
      coverageDays({ id: stationId, networkId }, from, to, at('2026-11-30T00:00:00Z'));
    expect(await days('2026-03-28', '2026-03-31')).toMatchObject([
      { date: '2026-03-28', elapsedSeconds: 86_400, validSeconds: 43_200, coverage: 0.5 },
      { date: '2026-03-29', elapsedSeconds: 82_800, validSeconds: 82_800, coverage: 1 },
      { date: '2026-03-30', validSeconds: 0 },
    ]);
    expect(await days('2026-10-25', '2026-10-26')).toMatchObject([
      { elapsedSeconds: 90_000, validSeconds: 90_000, coverage: 1 },
    ]);
    expect((await days('2026-12-01', '2026-12-02'))[0]?.coverage).toBeNull();
    const path = `${base}/coverage.csv?station=HL-5&from=2026-03-28&to=2026-03-29`;
    expect(await (await callApi('GET', path, regulator)).text()).toContain('2026-03-28,86400,43200,0,0.5');
  });
});
