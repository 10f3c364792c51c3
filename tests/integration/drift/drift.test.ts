import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertDayPeriods, type DayPeriod } from '#db/queries/dayPeriods';
import { insertStationToken } from '#db/queries/stationTokens';
import { watchDrift } from '#ingest/health/watchDrift';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import type { Drift, SelfCheckReceipt } from '#lib/contracts/drift';
import { driftSource, stationDrift } from '#lib/services/drift/stationDrift';
import { addDays, instantAtSec } from '#lib/time/zone';
import { sec } from '../levels/support/desk';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

/** One of four stations goes off by 0.1 dB a night; its self-checks show it, too. */
useFreshSchema();

const ZONE = 'Europe/London';
const FIRST = '2026-02-01';
const NIGHTS = 130;
const FROM_NIGHT = 100;
let networkId: number;
let ids: number[];
let operator: { session: string };

beforeAll(async () => {
  networkId = await makeNetwork('banks');
  operator = await makePerson(networkId, ['operator']);
  ids = [];
  for (const at of [1, 2, 3, 4])
    ids.push(await makeStation(networkId, `BK-${at}`, { latitude: 54 + at / 100 }));
  for (const [station, id] of ids.entries()) {
    await inTransaction((transaction) => insertDayPeriods(id, nightsOf(station), transaction));
  }
});

/** Weather that all share, a wobble of each, a night without data now and then, and the drift of the second. */
function nightsOf(station: number): DayPeriod[] {
  return Array.from({ length: NIGHTS }, (_, night) => night)
    .filter((night) => (night + 3 * station) % 11 !== 0)
    .map((night) => {
      const date = addDays(FIRST, night);
      const fromSec = instantAtSec(date, 23 * 60, ZONE);
      const toSec = instantAtSec(addDays(date, 1), 7 * 60, ZONE);
      const weatherDb = 4 * Math.sin(night / 9);
      const driftDb = station === 1 ? 0.1 * Math.max(0, night - FROM_NIGHT) : 0;
      const levels = new PeriodAccumulator({ bandClasses: true });
      for (let startSec = fromSec; startSec < toSec; startSec += 600) {
        const wobbleDb = ((night * 7 + station * 5) % 5) / 10 + (startSec % 7) / 10;
        const laeqCentiDb = Math.round(100 * (35 + 3 * station + weatherDb + wobbleDb + driftDb));
        levels.add(quiet(laeqCentiDb), true);
      }
      return { date, kind: 'night', fromSec, toSec, flagBits: 0, sums: levels.sums };
    });
}

function quiet(laeqCentiDb: number) {
  return {
    durationSec: 600,
    sampleSec: 600,
    laeqCentiDb,
    lafmaxCentiDb: null,
    lafminCentiDb: null,
    lceqCentiDb: null,
    lcpeakCentiDb: null,
    bandFraction: 3 as const,
    bandIndices: Int8Array.of(),
    levelsCentiDb: Int16Array.of(),
  };
}

const morningAfter = (night: number) => new Date(sec(`${addDays(FIRST, night + 1)}T12:00:00Z`) * 1000);
const troubles = () =>
  db()('health_troubles').orderBy('id').select('station_id', 'kind', 'is_open', 'measured');

test('it is told once, before one and a half bounds, of that station only, and over when it is', async () => {
  let toldNight = 0;
  for (const night of [100, 108]) expect(await watchDrift(morningAfter(night))).toBe(0);
  for (let night = 115; night < NIGHTS && toldNight === 0; night += 1) {
    if ((await watchDrift(morningAfter(night))) > 0) toldNight = night;
  }
  expect(0.1 * (toldNight - FROM_NIGHT)).toBeGreaterThan(1.5);
  expect(0.1 * (toldNight - FROM_NIGHT)).toBeLessThan(1.5 * 1.5);
  await watchDrift(morningAfter(toldNight + 1));
  expect(await troubles()).toEqual([
    { station_id: ids[1], kind: 'drift', is_open: 1, measured: expect.closeTo(1.6, 0) },
  ]);
  const mails: { subject: string }[] = await db()('outbox').select('subject');
  expect(mails).toHaveLength(1);
  expect(mails[0]?.subject).toContain('BK-2 Station BK-2: Nightly background has moved by +1.5 dB');
  // A wider bound ends it, with one message more; it takes two mornings to be sure.
  await callApi('PUT', '/api/v1/networks/banks/health/settings', {
    ...operator,
    body: { station: null, thresholds: { driftShift: 5 }, recipients: [] },
  });
  await watchDrift(morningAfter(toldNight + 1));
  await watchDrift(morningAfter(toldNight + 2));
  expect(await troubles()).toMatchObject([{ kind: 'drift', is_open: null }]);
  expect(await db()('outbox').select('subject')).toHaveLength(2);
});

test('the nights, what they are compared with and what was done are readable by every role', async () => {
  const source = await driftSource(networkId, sec('2026-06-09T12:00:00Z'));
  const station = source.stations.find(({ code }) => code === 'BK-2');
  const drift = station && (await stationDrift(station, source));
  expect(drift).toMatchObject({ neighbours: ['BK-1', 'BK-3', 'BK-4'], since: null, marks: [] });
  expect(drift?.background).toMatchObject({ state: 'fine', bound: 5 });
  expect(drift?.background.change).toBeGreaterThan(2);
  expect(drift?.days.find(({ date }) => date === addDays(FIRST, 20))).toMatchObject({ coverage: 1 });
  const { session } = await makePerson(networkId, ['regulator']);
  const path = '/api/v1/networks/banks/stations/BK-2/drift';
  const answer = (await (await callApi('GET', path, { session })).json()) as Drift;
  expect(answer.station).toBe('BK-2');
  const csv = await (await callApi('GET', `${path}.csv`, { session })).text();
  expect(csv.split('\r\n')[0]).toBe('date,LA90night,coverage,differenceDb,selfCheckDb,done');
});

test('self-checks are kept once; the same again is known, another of the same time refused', async () => {
  const token = await inTransaction((transaction) => insertStationToken(ids[0] ?? 0, null, transaction));
  const post = async (checks: unknown[], status = 200) => {
    const response = await callApi('POST', '/api/v1/self-checks', { token, body: { checks } });
    expect(response.status).toBe(status);
    return (await response.json()) as SelfCheckReceipt;
  };
  const checks = Array.from({ length: 100 }, (_, day) => ({
    at: new Date(Date.parse('2026-02-01T01:00:00Z') + day * 86_400_000).toISOString(),
    level: day < 85 ? 94 + (day % 2) / 10 : 93.2,
    nominal: 94,
  }));
  expect(await post(checks)).toMatchObject({ accepted: 100, known: 0, refused: [] });
  expect(await post(checks)).toMatchObject({ accepted: 0, known: 100, refused: [] });
  const wrong = await post([
    { ...checks[0], level: 90 },
    { at: '2099-01-01T00:00:00Z', level: 94, nominal: 94 },
  ]);
  expect(wrong.refused.map(({ code }) => code)).toEqual(['conflict', 'clock-ahead']);
  await post([{ at: 'yesterday', level: 94, nominal: 94 }], 422);
  await watchDrift(new Date('2026-05-11T12:00:00Z'));
  expect(await troubles()).toContainEqual({
    station_id: ids[0],
    kind: 'selfcheck',
    is_open: 1,
    measured: expect.closeTo(-0.85, 1),
  });
});
