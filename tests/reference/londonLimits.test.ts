import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertLimit, type LimitAveraging } from '#db/queries/limits';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { judgeDueWindows } from '#ingest/detect/judge';
import { pendWindowsFor } from '#ingest/detect/pendWindows';
import { receiveBatch } from '#ingest/receive/receive';
import { bandsOf } from '#lib/acoustics/bands';
import { flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { localDateAt } from '#lib/time/zone';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork, makeStation } from '../integration/support/people';
import { readJson } from './support/fixtures';
import { readLondonMinutes, type LondonMinute } from './support/london';

/** The exceedance lists of fixtures/london, found by limits from the received minutes: strictly greater, on tenths. */
const expected = readJson<{ exceedances: Record<string, string[]> }>(
  'london/expected_london.json',
).exceedances;
const ZONE = 'Europe/London';
const NOW = new Date('2026-06-01T00:00:00Z');

useFreshSchema();

let networkId = 0;
let stationId = 0;

beforeAll(async () => {
  networkId = await makeNetwork('limits', {
    timeZone: ZONE,
    rules: { maximumWindSpeedMs: 100, excludeRain: false },
  });
  stationId = await makeStation(networkId, 'LON', { firstBandIndex: -17, lastBandIndex: 13 });
  await addLimit('1h', 660);
  await addLimit('night', 560);
  await addLimit('15min', 720);
  const minutes = readLondonMinutes();
  for (let first = 0; first < minutes.length; first += 5000)
    await receive(minutes.slice(first, first + 5000));
  await aggregateAll(pendWindowsFor);
  while ((await judgeDueWindows(NOW, async () => undefined)) > 0);
});

function addLimit(averaging: LimitAveraging, thresholdTenths: number): Promise<number> {
  const fields = {
    effectiveFromSec: 0,
    name: averaging,
    metric: 'LAeq' as const,
    averaging,
    bandFraction: null,
    bandIndex: null,
    thresholdTenths,
    weekdays: 127,
    fromMin: null,
    toMin: null,
    minimumCoverage: 0.75,
    stationIds: null,
    recipients: [],
    reason: '',
    createdBy: null,
  };
  return inTransaction((transaction) => insertLimit(networkId, fields, transaction));
}

async function receive(minutes: LondonMinute[]): Promise<void> {
  const bands = bandsOf(3).filter(({ nominalHz }) => nominalHz >= 20);
  const envelope = {
    bands: bands.map(({ nominalHz }) => nominalHz),
    bandIndices: { indices: bands.map(({ index }) => index) },
    intervals: minutes.map(recordOf),
  };
  const receipt = await receiveBatch({ id: stationId, bandFraction: 3, acceptsFromSec: null }, envelope, NOW);
  expect(receipt.refused).toEqual([]);
}

function startsOf(averaging: LimitAveraging): Promise<number[]> {
  return db()('exceedances as e')
    .join('limit_versions as v', 'v.id', 'e.limit_version_id')
    .where({ 'v.averaging': averaging, 'e.state': 'standing' })
    .orderBy('e.starts_at')
    .pluck('e.starts_at');
}

const minute = (sec: number) => formatInstantUtc(sec).replace(':00Z', 'Z');

test('hours above 66.0 dB', async () => {
  expect((await startsOf('1h')).map(minute)).toEqual(expected['hour_LAeq_gt_66.0']);
});

test('quarter-hours above 72.0 dB', async () => {
  expect((await startsOf('15min')).map(minute)).toEqual(expected['quarter_LAeq_gt_72.0']);
});

test('nights above 56.0 dB, named by their evening', async () => {
  expect((await startsOf('night')).map((sec) => localDateAt(sec, ZONE))).toEqual(
    expected['night_LAeq_gt_56.0'],
  );
});

function recordOf({ startSec, interval, flags, windSpeedMs }: LondonMinute) {
  return {
    start: formatInstantUtc(startSec),
    seconds: 60,
    LAeq: interval.laeqCentiDb / 100,
    levels: Array.from(interval.levelsCentiDb, (centiDb) => centiDb / 100),
    flags: flagNames(flags),
    windSpeed: windSpeedMs,
  };
}
