import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { type StoredInterval } from '#db/queries/intervals';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { assignMast, endMastAssignment } from '#lib/services/weather/assign';
import { addMast, changeMast } from '#lib/services/weather/masts';
import { receiveWeather } from '#lib/services/weather/receive';
import { makeDesk, sec, type Desk } from '../levels/support/desk';
import { invent, storeMeasured } from '../levels/support/measured';
import { computedRows } from '../levels/support/tables';
import { useFreshSchema } from '../support/freshSchema';
import { makePerson, makeStation } from '../support/people';
import { rebuildAll } from '../levels/support/rebuildAll';

/** What is computed is a function of intervals, weather and assignments, whatever the order in which they came. */
useFreshSchema();

const nothing = async () => undefined;
const FROM_SEC = sec('2026-01-10T06:00:10Z');
const TO_SEC = sec('2026-01-10T10:00:10Z');
const NOW = new Date('2026-01-11T00:00:00Z');
/** Ten-minute records with holes: some minutes have a record, some the nearest one, some none. */
const RECORDS = Array.from({ length: 22 }, (_, at) => ({
  start: new Date((sec('2026-01-10T06:00:00Z') + at * 660) * 1000).toISOString(),
  seconds: 120,
  windSpeed: at % 4 === 0 ? 8.5 : 2.1,
  windDirection: (at * 37) % 360,
  rain: at % 7 === 0 ? 0.4 : 0,
})).filter((_, at) => at % 6 !== 5);

let desk: Desk;
let userId: string;
let intervals: StoredInterval[];
let made = 0;

beforeAll(async () => {
  desk = await makeDesk('weather-order');
  ({ userId } = await makePerson(desk.networkId, ['operator']));
  // A fifth of the minutes have a sensor of their own.
  const invented = await invent(
    { fromSec: FROM_SEC, toSec: TO_SEC, intervalSec: 60, bands: [-16, 9], gaps: 0.02 },
    3,
  );
  intervals = invented.map((one, at) => ({ ...one, flags: 0, windSpeedMs: at % 5 === 0 ? 1.2 : null }));
});

async function pair() {
  made += 1;
  const code = `W-${made}`;
  const stationId = await makeStation(desk.networkId, `ST-${made}`);
  const facts = { name: 'Mast', latitude: 54, longitude: 1, height: 10, maximumAge: 5 };
  await addMast(desk.networkId, { code, ...facts }, userId);
  const mast = await db()('masts').where({ code }).first('id');
  const actor = { networkId: desk.networkId, userId };
  const assign = (from: number, to: number | null) =>
    assignMast(actor, code, { station: `ST-${made}`, from, to });
  return { stationId, code, mast: { id: Number(mast.id), maximumAgeSec: 300 }, assign, actor, facts };
}

/** What is computed for a station, whichever it is. */
async function rowsOf(stationId: number) {
  const { quarters, periods } = await computedRows(stationId);
  const ofAny = (row: unknown) => ({ ...(row as Record<string, unknown>), station_id: 0 });
  return { quarters: quarters.map(ofAny), periods: periods.map(ofAny) };
}

const ASSIGNED_FROM = sec('2026-01-10T06:37:30Z');

async function expectedRows() {
  const { stationId, mast, assign } = await pair();
  await assign(ASSIGNED_FROM, null);
  await receiveWeather(mast, RECORDS, NOW);
  await storeMeasured(stationId, intervals);
  await aggregateAll(nothing);
  return rowsOf(stationId);
}

test('any order of weather, intervals, assignment and recomputation gives identical tables', async () => {
  const expected = await expectedRows();
  const reasons = await db()('quarter_hours').distinct().pluck('reason_bits');
  expect(reasons.some((bits: number) => (bits & (1 << 10)) !== 0)).toBe(true);
  const steps = ['assign', 'half', 'rest', 'weather', ...RECORDS.keys()] as const;
  const orders = fc.tuple(
    fc.shuffledSubarray([...steps], { minLength: steps.length }),
    fc.array(fc.boolean(), { minLength: steps.length, maxLength: steps.length }),
  );
  await fc.assert(
    fc.asyncProperty(orders, async ([order, recomputed]) => {
      const { stationId, mast, assign } = await pair();
      const half = Math.floor(intervals.length / 2);
      for (const [at, step] of order.entries()) {
        if (step === 'assign') await assign(ASSIGNED_FROM, null);
        else if (step === 'half') await storeMeasured(stationId, intervals.slice(0, half));
        else if (step === 'rest') await storeMeasured(stationId, intervals.slice(half));
        else if (step === 'weather') await receiveWeather(mast, RECORDS.slice(3, 9), NOW);
        else await receiveWeather(mast, [RECORDS[step]], NOW);
        if (recomputed[at]) await aggregateAll(nothing);
      }
      await aggregateAll(nothing);
      expect(await rowsOf(stationId)).toEqual(expected);
    }),
    { numRuns: 6 },
  );
});

test('ending an assignment, or a mast’s reach, computes anew what it decided; a rebuild finds the same', async () => {
  const { stationId, mast, assign, actor, code, facts } = await pair();
  await storeMeasured(stationId, intervals);
  await aggregateAll(nothing);
  const without = await computedRows(stationId);
  const outcome = await assign(FROM_SEC - 60, null);
  const id = outcome.kind === 'done' ? outcome.value.id : 0;
  await receiveWeather(mast, RECORDS, NOW);
  await aggregateAll(nothing);
  const near = await computedRows(stationId);
  expect(near).not.toEqual(without);
  await changeMast(desk.networkId, code, { ...facts, maximumAge: 1, isRetired: false }, userId);
  await aggregateAll(nothing);
  const nearer = await computedRows(stationId);
  expect(nearer).not.toEqual(near);
  await rebuildAll(nothing);
  expect(await computedRows(stationId)).toEqual(nearer);
  await endMastAssignment(actor, id, FROM_SEC - 30);
  await aggregateAll(nothing);
  expect(await computedRows(stationId)).toEqual(without);
});

test('only the quarter-hours that a record may decide are marked', async () => {
  const { stationId, mast, assign } = await pair();
  expect(await assign(0, null)).toMatchObject({ kind: 'done' });
  await storeMeasured(stationId, intervals);
  await aggregateAll(nothing);
  const start = '2026-01-10T09:21:00Z';
  const record = { start, seconds: 60, windSpeed: 9 };
  expect(await receiveWeather(mast, [record], NOW)).toMatchObject({ accepted: 1 });
  const marked = () => db()('dirty_marks').where({ station_id: stationId }).pluck('quarter_starts_at');
  expect(await marked()).toEqual([sec('2026-01-10T09:15:00Z')]);
  await receiveWeather(mast, [record], NOW);
  expect(await marked()).toHaveLength(1);
});
