import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { type StoredInterval } from '#db/queries/intervals';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Statistics } from '#lib/contracts/levels';
import { addExclusion } from '#lib/services/exclusions/add';
import { useFreshSchema } from '../support/freshSchema';
import { makeStation } from '../support/people';
import { makeDesk, sec, type Desk } from './support/desk';
import { expectBroadband, expectOctave, expectThird } from './support/expectSecondPath';
import { invent, storeMeasured, type Stretch } from './support/measured';
import { spoilDirty } from './support/tables';

/**
 * `…/statistics` of random periods against figures straight from the intervals by the database's own arithmetic: over the
 * clock change of 29 March 2026, on quarter-hours and off, with what waits for recomputation, exclusions, a changed interval
 * length and a grid that lies askew.
 */
const THIRDS: [number, number] = [-16, 9];
const STRETCHES: Stretch[] = [
  {
    fromSec: sec('2026-03-27T06:00:00Z'),
    toSec: sec('2026-03-28T15:00:00Z'),
    intervalSec: 60,
    bands: THIRDS,
  },
  {
    fromSec: sec('2026-03-28T15:20:17Z'),
    toSec: sec('2026-03-30T00:00:00Z'),
    intervalSec: 60,
    bands: THIRDS,
  },
  {
    fromSec: sec('2026-03-30T00:10:00Z'),
    toSec: sec('2026-03-30T06:10:00Z'),
    intervalSec: 3600,
    bands: THIRDS,
  },
  { fromSec: sec('2026-03-30T06:13:20Z'), toSec: sec('2026-03-30T06:41:00Z'), intervalSec: 1, bands: THIRDS },
  {
    fromSec: sec('2026-03-30T07:00:00Z'),
    toSec: sec('2026-03-31T12:00:00Z'),
    intervalSec: 60,
    bands: THIRDS,
  },
];
const FIRST_SEC = sec('2026-03-27T00:00:00Z');
const LAST_SEC = sec('2026-03-31T18:00:00Z');

useFreshSchema();

let desk: Desk;
let stationId: number;

beforeAll(async () => {
  desk = await makeDesk('periods');
  stationId = await makeStation(desk.networkId, 'PERIODS');
  const measured = await Promise.all(STRETCHES.map((stretch, at) => invent(stretch, 71 + at)));
  const [early, late] = inTwo(measured.flat());
  await storeMeasured(stationId, early);
  await aggregateAll(async () => undefined);
  await exclude('2026-03-28T01:10:30Z', '2026-03-28T02:00:00Z');
  await exclude('2026-03-29T00:40:00Z', '2026-03-29T01:20:59Z');
  await aggregateAll(async () => undefined);
  // What came late, and one exclusion more, wait; what was computed before must not be read any more.
  await storeMeasured(stationId, late);
  await exclude('2026-03-30T02:00:00Z', '2026-03-30T02:00:01Z');
  await spoilDirty(stationId);
});

/** All but an afternoon and some minutes of a night, and these. */
function inTwo(intervals: readonly StoredInterval[]): [StoredInterval[], StoredInterval[]] {
  const isLate = ({ startSec }: StoredInterval) =>
    (sec('2026-03-27T13:02:00Z') <= startSec && startSec < sec('2026-03-27T17:31:00Z')) ||
    (sec('2026-03-29T00:50:00Z') <= startSec && startSec < sec('2026-03-29T01:12:00Z')) ||
    (sec('2026-03-30T05:00:00Z') <= startSec && startSec < sec('2026-03-30T06:20:00Z'));
  return [intervals.filter((one) => !isLate(one)), intervals.filter(isLate)];
}

async function exclude(from: string, to: string): Promise<void> {
  const span = { fromSec: sec(from), toSec: sec(to) };
  const { networkId, userId } = desk;
  await addExclusion({ networkId, stationCode: 'PERIODS', ...span, reason: 'Grass is mown', userId });
}

const anInstant = fc.integer({ min: FIRST_SEC, max: LAST_SEC });
const aQuarter = fc.integer({ min: FIRST_SEC / 900, max: LAST_SEC / 900 }).map((quarter) => quarter * 900);
const aLength = fc.oneof(
  fc.integer({ min: 1, max: 1800 }),
  fc.integer({ min: 1, max: 2 * 86_400 }),
  fc.integer({ min: 1, max: 192 }).map((quarters) => quarters * 900),
);
const aPeriod = fc
  .tuple(fc.oneof(anInstant, aQuarter), aLength)
  .map(([fromSec, lengthSec]) => ({ fromSec, toSec: Math.min(fromSec + lengthSec, LAST_SEC + 900) }));

test('random periods equal the second path', async () => {
  const index = fc.integer({ min: THIRDS[0], max: THIRDS[1] });
  await fc.assert(
    fc.asyncProperty(aPeriod, fc.boolean(), index, async (period, isAll, third) => {
      await expectEqual({ ...period, isAll }, third);
    }),
    {
      numRuns: 45,
      seed: 20_260_329,
      examples: [
        // Both sides of the clock change; the whole; a second; within one interval of an hour; before anything.
        [{ fromSec: sec('2026-03-28T23:00:00Z'), toSec: sec('2026-03-29T06:00:00Z') }, false, 0],
        [{ fromSec: FIRST_SEC, toSec: LAST_SEC }, false, -5],
        [{ fromSec: sec('2026-03-29T01:00:00Z'), toSec: sec('2026-03-29T01:00:01Z') }, true, 3],
        [{ fromSec: sec('2026-03-30T03:17:00Z'), toSec: sec('2026-03-30T03:18:00Z') }, false, 9],
        [{ fromSec: FIRST_SEC, toSec: FIRST_SEC + 900 }, false, 0],
      ],
    },
  );
});

async function expectEqual(
  { fromSec, toSec, isAll }: { fromSec: number; toSec: number; isAll: boolean },
  third: number,
): Promise<void> {
  const [from, to] = [formatInstantUtc(fromSec), formatInstantUtc(toSec)];
  const what = `${from} to ${to}${isAll ? ', everything' : ''}:`;
  const validity = isAll ? 'all' : 'rules';
  const figures = await desk.read<Statistics>('PERIODS', 'statistics', { from, to, validity });
  const asked = { stationId, fromSec, toSec, isAll };
  await expectBroadband(figures, asked, what);
  await expectThird(figures, asked, third, what);
  await expectOctave(figures, asked, 3 * Math.round(third / 3), what);
}

test('the same once everything has been recomputed', async () => {
  await aggregateAll(async () => undefined);
  await fc.assert(
    fc.asyncProperty(aPeriod, async (period) => {
      await expectEqual({ ...period, isAll: false }, -3);
    }),
    { numRuns: 25, seed: 7 },
  );
});

test('any cut of a period conserves seconds and energy', async () => {
  const energyOf = async (fromSec: number, toSec: number) => {
    const [from, to] = [formatInstantUtc(fromSec), formatInstantUtc(toSec)];
    const { seconds, LAE } = await desk.read<Statistics>('PERIODS', 'statistics', { from, to });
    return { seconds, energySec: LAE === null ? 0 : 10 ** (LAE / 10) };
  };
  const whole = await energyOf(FIRST_SEC, LAST_SEC);
  await fc.assert(
    fc.asyncProperty(fc.uniqueArray(anInstant, { minLength: 1, maxLength: 5 }), async (cuts) => {
      const edges = [...new Set([FIRST_SEC, ...cuts, LAST_SEC])].sort((a, b) => a - b);
      const sum = { expected: 0, valid: 0, excluded: 0 };
      let energySec = 0;
      for (let at = 1; at < edges.length; at += 1) {
        const part = await energyOf(edges[at - 1] ?? NaN, edges[at] ?? NaN);
        sum.expected += part.seconds.expected;
        sum.valid += part.seconds.valid;
        sum.excluded += part.seconds.excluded;
        energySec += part.energySec;
      }
      expect(sum).toEqual(whole.seconds);
      expect(Math.abs(energySec / whole.energySec - 1)).toBeLessThan(1e-9);
    }),
    { numRuns: 6, seed: 3 },
  );
});
