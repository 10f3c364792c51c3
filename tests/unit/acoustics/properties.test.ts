import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { energyMeanDb, energySumDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { octavesFromThirdsDb } from '#lib/acoustics/octaves';
import { PeriodAccumulator, type AccumulatedInterval } from '#lib/acoustics/periodStatistics';
import { interval, thirdIndices } from './support/intervals';

const bandIndices = thirdIndices(25, 10000);
const stored = fc.integer({ min: -3000, max: 20000 });
const maybeStored = fc.option(stored, { nil: NO_LEVEL_CENTI_DB });
const anInterval = fc
  .record({
    durationSec: fc.integer({ min: 1, max: 3600 }),
    laeqCentiDb: stored,
    lafmaxCentiDb: fc.option(stored),
    lafminCentiDb: fc.option(stored),
    lceqCentiDb: fc.option(stored),
    sampleSec: fc.constantFrom(60, 60, 60, 60, 1),
    levels: fc.array(maybeStored, { minLength: bandIndices.length, maxLength: bandIndices.length }),
  })
  .map(({ levels, ...parts }) => interval({ ...parts, bandIndices, levelsCentiDb: Int16Array.from(levels) }));
const judged = fc.tuple(anInterval, fc.boolean());

function gather(intervals: readonly (readonly [AccumulatedInterval, boolean])[]): PeriodAccumulator {
  const figures = new PeriodAccumulator({ bandClasses: true });
  for (const [one, isValid] of intervals) figures.add(one, isValid);
  return figures;
}

function expectSameLevel(a: number | null, b: number | null): void {
  if (a === null || b === null) expect(a).toBe(b);
  else expect(Math.abs(a - b)).toBeLessThan(1e-9);
}

function expectSame(a: PeriodAccumulator, b: PeriodAccumulator): void {
  const plain = ({ sums }: PeriodAccumulator) => [
    sums.validSec,
    sums.excludedSec,
    sums.cValidSec,
    sums.lafmaxCentiDb,
    sums.lafminCentiDb,
    sums.sampleSec,
    sums.isSampleMixed,
    [...sums.bandValidSec],
    [...sums.aClasses.encode()],
    sums.bandClasses?.bands.map((counts) => [...counts.encode()]),
    sums.bandClasses?.octaves.map((counts) => [...counts.encode()]),
  ];
  expect(plain(a)).toEqual(plain(b));
  expectSameLevel(a.laeqDb(), b.laeqDb());
  expectSameLevel(a.lceqDb(), b.lceqDb());
  for (const index of bandIndices) expectSameLevel(a.bandLeqDb(index), b.bandLeqDb(index));
  for (const index of [-15, 0, 9]) expectSameLevel(a.octaveLeqDb(index), b.octaveLeqDb(index));
}

describe('properties', () => {
  test('merging in any grouping and order is the whole, to 1e-9 dB', () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(judged, { maxLength: 6 }), { maxLength: 5 }),
        fc.boolean(),
        (groups, fromRight) => {
          const whole = gather(groups.flat());
          const parts = groups.map(gather);
          const merged = new PeriodAccumulator({ bandClasses: true });
          for (const part of fromRight ? parts.reverse() : parts) merged.merge(part);
          expectSame(merged, whole);
          // Two halves merged first, then with each other.
          const middle = Math.floor(groups.length / 2);
          const left = gather(groups.slice(0, middle).flat());
          left.merge(gather(groups.slice(middle).flat()));
          expectSame(left, whole);
        },
      ),
      { numRuns: 60 },
    );
  });

  test('an interval clipped in two is the interval', () => {
    fc.assert(
      fc.property(anInterval, fc.integer({ min: 1, max: 3599 }), (one, cut) => {
        fc.pre(cut < one.durationSec);
        const parts = [
          { ...one, durationSec: cut },
          { ...one, durationSec: one.durationSec - cut },
        ];
        expectSame(gather(parts.map((part) => [part, true] as const)), gather([[one, true]]));
      }),
      { numRuns: 60 },
    );
  });

  test('Leq lies between the lowest and the highest level', () => {
    const levels = fc.array(
      fc.tuple(fc.double({ min: -30, max: 200, noNaN: true }), fc.integer({ min: 1, max: 3600 })),
      {
        minLength: 1,
      },
    );
    fc.assert(
      fc.property(levels, (weighted) => {
        const levelsDb = weighted.map(([levelDb]) => levelDb);
        const meanDb =
          energyMeanDb(
            levelsDb,
            weighted.map(([, sec]) => sec),
          ) ?? NaN;
        expect(meanDb).toBeGreaterThanOrEqual(Math.min(...levelsDb) - 1e-9);
        expect(meanDb).toBeLessThanOrEqual(Math.max(...levelsDb) + 1e-9);
      }),
    );
  });

  test('octaves hold exactly the energy of their thirds', () => {
    const thirds = bandRange(3, 12.5, 20000);
    const levels = fc.array(fc.double({ min: -30, max: 200, noNaN: true }), {
      minLength: thirds.length,
      maxLength: thirds.length,
    });
    fc.assert(
      fc.property(levels, (levelsDb) => {
        const octavesDb = octavesFromThirdsDb(levelsDb, thirds).levelsDb.filter(
          (levelDb) => levelDb !== null,
        );
        expect(octavesDb).toHaveLength(11);
        expect(energySumDb(octavesDb)).toBeCloseTo(energySumDb(levelsDb) ?? NaN, 9);
      }),
    );
  });

  const classes = fc.array(
    fc.tuple(fc.integer({ min: -300, max: 2048 }), fc.integer({ min: 0, max: 90_000 })),
  );
  const countsOf = (entries: readonly (readonly [number, number])[]) => {
    const counts = new LevelClassCounts();
    for (const [tenths, sec] of entries) counts.addTenths(tenths, sec);
    return counts;
  };

  test('L1 ≥ L5 ≥ L10 ≥ L50 ≥ L90 ≥ L95 ≥ L99, each by its definition', () => {
    fc.assert(
      fc.property(classes, (entries) => {
        const counts = countsOf(entries);
        fc.pre(counts.totalSec > 0);
        const levels = [1, 5, 10, 50, 90, 95, 99].map((percent) => counts.exceededTenths(percent) ?? NaN);
        expect(levels).toEqual([...levels].sort((a, b) => b - a));
        [1, 5, 10, 50, 90, 95, 99].forEach((percent, i) => {
          const secAbove = (tenths: number) =>
            entries.reduce((sum, [level, sec]) => sum + (level > tenths ? sec : 0), 0);
          const level = levels[i] ?? NaN;
          expect(secAbove(level) * 100).toBeLessThanOrEqual(percent * counts.totalSec);
          expect(secAbove(level - 1) * 100).toBeGreaterThan(percent * counts.totalSec);
        });
      }),
    );
  });

  test('class counts survive encoding; equal counts are equal bytes whatever the order', () => {
    fc.assert(
      fc.property(classes, (entries) => {
        const counts = countsOf(entries);
        const decoded = LevelClassCounts.decode(counts.encode());
        expect([...decoded.entries()]).toEqual([...counts.entries()]);
        expect(decoded.totalSec).toBe(counts.totalSec);
        expect(countsOf([...entries].reverse()).encode()).toEqual(counts.encode());
      }),
    );
  });

  test('merged class counts are the counts of both, however they are grouped', () => {
    fc.assert(
      fc.property(classes, classes, classes, (a, b, c) => {
        const left = countsOf(a);
        left.merge(countsOf(b));
        left.merge(countsOf(c));
        const right = countsOf(b);
        right.merge(countsOf(c));
        const outer = countsOf(a);
        outer.merge(right);
        const whole = countsOf([...a, ...b, ...c]).encode();
        expect(left.encode()).toEqual(whole);
        expect(outer.encode()).toEqual(whole);
      }),
    );
  });
});
