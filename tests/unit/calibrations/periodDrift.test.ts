import { expect, test } from 'vitest';
import { periodDrift } from '#lib/services/calibrations/periodDrift';

const check = (instrumentId: number, checkedAtSec: number, before: number, after: number | null = null) => ({
  instrumentId,
  checkedAtSec,
  calibratorCentiDb: 9400,
  beforeCentiDb: 9400 + before,
  afterCentiDb: after === null ? null : 9400 + after,
});
const PERIOD = { fromSec: 1000, toSec: 2000 };
const STAY = { instrumentId: 1, startSec: 0, endSec: null };

test('the checks that enclose a period count: what was left before, found after', () => {
  const checks = [check(1, 3000, -30), check(1, 500, 80, 10), check(1, 100, 300), check(1, 4000, 90)];
  expect(periodDrift(PERIOD, [STAY], checks)).toEqual({ driftDb: 0.3, known: 'both' });
  expect(periodDrift(PERIOD, [STAY], checks.slice(1, 3))).toEqual({ driftDb: 0.1, known: 'before' });
  expect(periodDrift(PERIOD, [STAY], [check(1, 3000, -30)])).toEqual({ driftDb: 0.3, known: 'after' });
});

test('of a check within it counts what it found and what it left', () => {
  const within = [check(1, 500, 0), check(1, 1500, -60, 5), check(1, 2500, 10)];
  expect(periodDrift(PERIOD, [STAY], within)).toEqual({ driftDb: 0.6, known: 'both' });
});

test('each instrument of the period counts with its own checks, others do not', () => {
  const stays = [
    { instrumentId: 1, startSec: 0, endSec: 1500 },
    { instrumentId: 2, startSec: 1500, endSec: null },
  ];
  const checks = [check(1, 500, 5), check(1, 1600, 20), check(2, 1400, 0), check(3, 1500, 500)];
  expect(periodDrift(PERIOD, stays, checks)).toEqual({ driftDb: 0.2, known: 'before' });
  expect(periodDrift(PERIOD, [], checks)).toEqual({ driftDb: 0, known: 'none' });
});
