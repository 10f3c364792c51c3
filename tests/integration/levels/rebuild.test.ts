import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { type StoredInterval } from '#db/queries/intervals';
import { aggregateAll, aggregateMarks } from '#ingest/aggregate/aggregate';
import { addExclusion } from '#lib/services/exclusions/add';
import { withdraw } from '#lib/services/exclusions/withdraw';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from './support/desk';
import { invent, seededNoise, storeMeasured } from './support/measured';
import { computedRows } from './support/tables';
import { rebuildAll } from './support/rebuildAll';

/** What is computed from intervals is a function of the intervals and the exclusions, whatever happened on the way. */
useFreshSchema();

const nothing = async () => undefined;

let desk: Desk;
let stationId: number;
let measured: StoredInterval[];
let computed: Awaited<ReturnType<typeof computedRows>>;

beforeAll(async () => {
  desk = await makeDesk('rebuild');
  stationId = await makeStation(desk.networkId, 'REBUILD');
  // Over the autumn clock change, on a grid that lies askew, then on whole minutes.
  const askew = { fromSec: sec('2025-10-24T21:00:23Z'), toSec: sec('2025-10-26T09:30:00Z') };
  const whole = { fromSec: sec('2025-10-26T09:31:00Z'), toSec: sec('2025-10-27T12:00:00Z') };
  measured = [
    ...(await invent({ ...askew, intervalSec: 60, bands: [-16, 9], gaps: 0.02 }, 11)),
    ...(await invent({ ...whole, intervalSec: 60, bands: [-16, 9], gaps: 0.02 }, 12)),
  ];
  await storeMeasured(stationId, measured);
  await aggregateAll(nothing);
  computed = await computedRows(stationId);
});

test('quarter-hours and periods that were dropped are computed again identically', async () => {
  expect(computed.quarters.length).toBeGreaterThan(200);
  expect(computed.periods).toHaveLength(9);
  await db()('quarter_hours').where({ station_id: stationId }).delete();
  await db()('day_periods').where({ station_id: stationId }).delete();
  await rebuildAll(nothing);
  expect(await computedRows(stationId)).toEqual(computed);
  expect(await db()('dirty_marks').where({ station_id: stationId })).toHaveLength(0);
});

test('the same rows come of any order of arrival, of small rounds, and of two workers at once', async () => {
  const otherId = await makeStation(desk.networkId, 'SHUFFLED');
  const noise = seededNoise(5);
  const shuffled = measured
    .map((interval) => ({ interval, place: noise() }))
    .sort((a, b) => a.place - b.place)
    .map(({ interval }) => interval);
  for (let first = 0; first < shuffled.length; first += 900) {
    await storeMeasured(otherId, shuffled.slice(first, first + 900));
    await Promise.all([
      aggregateMarks(nothing, { mostMarks: 70 }),
      aggregateMarks(nothing, { mostMarks: 110 }),
    ]);
  }
  await Promise.all([aggregateAll(nothing), aggregateAll(nothing)]);
  const ofFirst = (rows: unknown[]) => rows.map((row) => ({ ...(row as object), station_id: stationId }));
  const { quarters, periods } = await computedRows(otherId);
  expect(ofFirst(quarters)).toEqual(computed.quarters);
  expect(ofFirst(periods)).toEqual(computed.periods);
});

test('an exclusion that is withdrawn leaves every row as it was; of two that overlap one still holds', async () => {
  const { networkId, userId } = desk;
  const exclude = async (from: string, to: string) => {
    const span = { fromSec: sec(from), toSec: sec(to) };
    const reason = 'Scaffolding at the mast';
    const added = await addExclusion({ networkId, stationCode: 'REBUILD', ...span, reason, userId });
    await aggregateAll(nothing);
    return added?.id ?? NaN;
  };
  const endExclusion = async (id: number) => {
    await withdraw({ networkId, id, reason: 'Was another station', userId });
    await aggregateAll(nothing);
  };
  // Begins and ends within intervals that lie across a quarter-hour's edge, over the hour that comes twice.
  const long = await exclude('2025-10-25T22:00:01Z', '2025-10-26T02:15:02Z');
  const excluded = await computedRows(stationId);
  expect(excluded).not.toEqual(computed);
  const short = await exclude('2025-10-26T02:00:00Z', '2025-10-26T04:00:00Z');
  await endExclusion(short);
  expect(await computedRows(stationId)).toEqual(excluded);
  await endExclusion(long);
  expect(await computedRows(stationId)).toEqual(computed);
});

test('quarter-hours and periods each hold all the seconds and the energy of the intervals, none twice', async () => {
  const [[direct]] = await db().raw(
    `SELECT SUM(duration_sec) AS sec FROM interval_levels WHERE station_id = ?`,
    [stationId],
  );
  const [[counted]] = await db().raw(
    `SELECT SUM(duration_sec * POW(10, laeq_centi_db / 1000)) AS energy, SUM(duration_sec) AS sec FROM interval_levels
     WHERE station_id = ? AND (flags & 493) = 0 AND COALESCE(wind_speed_centi_ms, 0) <= 500`,
    [stationId],
  );
  for (const table of ['quarter_hours', 'day_periods']) {
    const [[sums]] = await db().raw(
      `SELECT SUM(valid_sec) AS valid, SUM(excluded_sec) AS excluded, SUM(a_energy_sec) AS energy FROM ${table}
       WHERE station_id = ?`,
      [stationId],
    );
    expect(Number(sums.valid), table).toBe(Number(counted.sec));
    expect(Number(sums.valid) + Number(sums.excluded), table).toBe(Number(direct.sec));
    expect(Math.abs(sums.energy / counted.energy - 1), table).toBeLessThan(1e-12);
  }
});
