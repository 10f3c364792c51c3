import { expect, test } from 'vitest';
import { capacityOf, type Plan } from '#ops/capacity/model';

const PLAN: Plan = {
  stations: 6,
  intervalSec: 60,
  bands: 31,
  keptDays: 28,
  computedDays: 28,
  postSec: 60,
};

/** Bytes a row of six stations’ 28 days of minutes, by `ops/capacity.ts --measure --stations 6 --days 28`. */
const MEASURED = {
  interval_levels: 128,
  quarter_hours: 555,
  day_periods: 19_597,
  station_day_traces: 84_456,
};

test('a network that was measured takes what the model says, within a twentieth', () => {
  const { tables } = capacityOf(PLAN);
  for (const [table, bytesARow] of Object.entries(MEASURED)) {
    const size = tables[table as keyof typeof MEASURED];
    expect(size.bytesARow / bytesARow, table).toBeGreaterThan(0.95);
    expect(size.bytesARow / bytesARow, table).toBeLessThan(1.05);
  }
  expect(tables.interval_levels.rows).toBe(241_920);
  expect(tables.quarter_hours.rows).toBe(16_128);
});

test('ten times the stations need ten times everything; seconds sixty times the intervals and no more quarter-hours', () => {
  const one = capacityOf(PLAN);
  const ten = capacityOf({ ...PLAN, stations: 60 });
  for (const what of [
    'diskBytes',
    'intervalsASec',
    'postsASec',
    'webCores',
    'workerCores',
    'memoryBytes',
  ] as const)
    expect(ten[what] / one[what], what).toBeCloseTo(10, 9);
  const seconds = capacityOf({ ...PLAN, intervalSec: 1 });
  expect(seconds.tables.interval_levels.rows / one.tables.interval_levels.rows).toBeCloseTo(60, 9);
  expect(seconds.tables.quarter_hours).toEqual(one.tables.quarter_hours);
  expect(seconds.postsASec).toBe(one.postsASec);
});

test('intervals that are kept for less time take less disk; what is computed of them stays', () => {
  const year = capacityOf({ ...PLAN, keptDays: 365, computedDays: 3650 });
  const always = capacityOf({ ...PLAN, keptDays: 3650, computedDays: 3650 });
  expect(always.tables.interval_levels.bytes / year.tables.interval_levels.bytes).toBeCloseTo(10, 9);
  expect(always.tables.quarter_hours).toEqual(year.tables.quarter_hours);
  expect(always.memoryBytes).toBe(year.memoryBytes);
});
