import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { completePeriods } from '#ingest/aggregate/completePeriods';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { makeDesk, sec } from './support/desk';
import { invent, storeMeasured } from './support/measured';
import { computedRows } from './support/tables';

/** A day, evening or night gets its row when it has ended, also when nothing is posted after that. */
useFreshSchema();

const nothing = async () => undefined;

let stationId: number;

beforeAll(async () => {
  vi.useFakeTimers({ toFake: ['Date'], now: new Date('2026-02-11T15:00:30Z') });
  const { networkId } = await makeDesk('running');
  stationId = await makeStation(networkId, 'RUNNING');
  const lately = {
    fromSec: sec('2026-02-10T12:00:00Z'),
    toSec: sec('2026-02-11T15:00:00Z'),
    intervalSec: 60,
  };
  await storeMeasured(stationId, await invent({ ...lately, bands: [-16, 9], gaps: 0 }, 3));
  await aggregateAll(nothing);
});

afterAll(() => vi.useRealTimers());

test('the running period has no row, those before have theirs', async () => {
  expect(await periodsWithRow()).toEqual(['day', 'evening', 'night']);
});

test('an ended period without a row is marked once, then computed as it was', async () => {
  expect(await completePeriods(new Date())).toBe(0);
  const computed = await computedRows(stationId);
  await db()('day_periods').where({ station_id: stationId, period: 'night' }).delete();
  expect(await completePeriods(new Date())).toBe(1);
  await aggregateAll(nothing);
  expect(await computedRows(stationId)).toEqual(computed);
});

test('the running one is computed after its end, although nothing more came', async () => {
  vi.setSystemTime(new Date('2026-02-11T19:00:00Z'));
  expect(await completePeriods(new Date())).toBe(1);
  await aggregateAll(nothing);
  expect(await periodsWithRow()).toEqual(['day', 'evening', 'night', 'day']);
  expect(await completePeriods(new Date())).toBe(0);
});

async function periodsWithRow(): Promise<string[]> {
  return db()('day_periods').where({ station_id: stationId }).orderBy('starts_at').pluck('period');
}
