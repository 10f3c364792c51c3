import { describe, expect, test } from 'vitest';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { interval, thirdIndices } from './support/intervals';

function gather(...intervals: ReturnType<typeof interval>[]): PeriodAccumulator {
  const figures = new PeriodAccumulator({ bandClasses: true });
  for (const one of intervals) figures.add(one, true);
  return figures;
}

const octave1k = thirdIndices(800, 1250);

describe('sums of a period', () => {
  test('nothing is null everywhere', () => {
    const nothing = new PeriodAccumulator({ bandClasses: true });
    expect([
      nothing.laeqDb(),
      nothing.lceqDb(),
      nothing.laeDb(),
      nothing.bandLeqDb(0),
      nothing.octaveLeqDb(0),
    ]).toEqual([null, null, null, null, null]);
    expect(nothing.exceedanceLevelDb(50)).toBeNull();
    expect(nothing.bandExceedanceLevelDb(0, 50)).toBeNull();
    expect(nothing.sums.lafmaxCentiDb).toBeNull();
  });

  test('an interval that does not count adds its seconds to those excluded, and nothing else', () => {
    const figures = gather(interval());
    figures.add(interval({ laeqCentiDb: 9400, lafmaxCentiDb: 9500, sampleSec: 10, durationSec: 10 }), false);
    expect(figures.sums).toMatchObject({ validSec: 60, excludedSec: 10, lafmaxCentiDb: null, sampleSec: 60 });
    expect(figures.laeqDb()).toBeCloseTo(50, 9);
  });

  test('durations weigh: five minutes at 70 dB, ten at 60, 45 at 50', () => {
    const figures = gather(
      interval({ durationSec: 300, laeqCentiDb: 7000 }),
      interval({ durationSec: 600, laeqCentiDb: 6000 }),
      interval({ durationSec: 2700, laeqCentiDb: 5000 }),
    );
    expect(figures.laeqDb()).toBeCloseTo(60.3141, 4);
    expect(figures.laeDb()).toBeCloseTo(60.3141 + 10 * Math.log10(3600), 4);
  });

  test('LCeq and every band have their own seconds', () => {
    const bandIndices = Int8Array.from([0, 1]);
    const figures = gather(
      interval({ lceqCentiDb: 6000, bandIndices, levelsCentiDb: Int16Array.from([4000, 3000]) }),
      interval({ bandIndices, levelsCentiDb: Int16Array.from([5000, NO_LEVEL_CENTI_DB]) }),
    );
    expect(figures.lceqDb()).toBeCloseTo(60, 9);
    expect(figures.bandLeqDb(0)).toBeCloseTo(10 * Math.log10((1e4 + 1e5) / 2), 9);
    expect(figures.bandLeqDb(1)).toBeCloseTo(30, 9);
    expect([figures.sums.cValidSec, figures.sums.bandValidSec[19], figures.sums.bandValidSec[20]]).toEqual([
      60, 120, 60,
    ]);
  });

  test('extremes of valid intervals, clipped ones too', () => {
    const figures = gather(
      interval({ lafmaxCentiDb: 7000, lafminCentiDb: 3000, lcpeakCentiDb: 9000 }),
      interval({ durationSec: 1, lafmaxCentiDb: 8000, lafminCentiDb: 2900, lcpeakCentiDb: null }),
    );
    expect(figures.sums).toMatchObject({ lafmaxCentiDb: 8000, lafminCentiDb: 2900, lcpeakCentiDb: 9000 });
  });

  test('the sample length is the interval’s own, clipped or not; mixed lengths have none, and no L_N', () => {
    const clipped = gather(...Array.from({ length: 40 }, () => interval()), interval({ durationSec: 7 }));
    expect(clipped.sums.sampleSec).toBe(60);
    expect(clipped.exceedanceLevelDb(10)).toBe(50);
    clipped.merge(gather(interval({ sampleSec: 1, durationSec: 1 })));
    expect(clipped.sums).toMatchObject({ sampleSec: null, isSampleMixed: true });
    clipped.merge(gather(interval()));
    expect(clipped.sums).toMatchObject({ sampleSec: null, isSampleMixed: true });
    expect(clipped.exceedanceLevelDb(10)).toBeNull();
  });

  test.each([0, -60, 0.5, NaN])('%d s is no duration', (durationSec) => {
    expect(() => new PeriodAccumulator().add(interval({ durationSec }), true)).toThrow(RangeError);
    expect(() => new PeriodAccumulator().add(interval({ durationSec }), false)).toThrow(RangeError);
  });

  test('bands that do not match, or are none, are refused', () => {
    const levelsCentiDb = Int16Array.from([4000]);
    const add = (bandIndices: Int8Array) => () =>
      new PeriodAccumulator().add(interval({ levelsCentiDb, bandIndices }), true);
    expect(add(new Int8Array(0))).toThrow(RangeError);
    expect(add(Int8Array.from([14]))).toThrow(RangeError);
    expect(add(Int8Array.from([-20]))).toThrow(RangeError);
  });
});

describe('octaves of a period', () => {
  test('an octave’s L_N is of each interval’s sum, not the sum of the thirds’ L_N', () => {
    // Three thirds that take turns: one at 60 dB, two at 40.
    const turns = Array.from({ length: 60 }, (_, i) =>
      interval({
        bandIndices: octave1k,
        levelsCentiDb: Int16Array.from([0, 1, 2].map((n) => (n === i % 3 ? 6000 : 4000))),
      }),
    );
    const figures = gather(...turns);
    expect(figures.bandExceedanceLevelDb(0, 50)).toBe(40);
    expect(figures.octaveExceedanceLevelDb(0, 50)).toBe(60.1);
    expect(figures.octaveLeqDb(0)).toBeCloseTo(10 * Math.log10(1e6 + 2e4), 9);
  });

  test('an interval that lacks a third has no octave sample; a third never measured leaves no octave', () => {
    const whole = interval({ bandIndices: octave1k, levelsCentiDb: Int16Array.from([4000, 4000, 4000]) });
    const lacking = interval({
      bandIndices: octave1k,
      levelsCentiDb: Int16Array.from([4000, NO_LEVEL_CENTI_DB, 4000]),
    });
    expect(gather(whole, lacking).sums.bandClasses?.octaves[6]?.totalSec).toBe(60);
    expect(gather(lacking).octaveLeqDb(0)).toBeNull();
  });

  test('an octave station’s octaves are its own', () => {
    const own = gather(
      ...Array.from({ length: 30 }, () =>
        interval({
          bandFraction: 1,
          bandIndices: Int8Array.from([0]),
          levelsCentiDb: Int16Array.from([4210]),
        }),
      ),
    );
    expect(own.octaveLeqDb(0)).toBeCloseTo(42.1, 9);
    expect(own.octaveExceedanceLevelDb(0, 10)).toBe(42.1);
    expect(own.octaveLeqDb(3)).toBeNull();
  });

  test('octaves and thirds in one period leave no band figures, in any order', () => {
    const thirds = gather(
      interval({ bandIndices: octave1k, levelsCentiDb: Int16Array.from([4000, 4000, 4000]) }),
    );
    const octaves = gather(
      interval({ bandFraction: 1, bandIndices: Int8Array.from([0]), levelsCentiDb: Int16Array.from([6000]) }),
    );
    for (const order of [
      [thirds, octaves, thirds],
      [octaves, thirds, thirds],
      [thirds, thirds, octaves],
    ]) {
      const merged = new PeriodAccumulator({ bandClasses: true });
      for (const part of order) merged.merge(part);
      expect(merged.sums).toMatchObject({ bandFraction: null, isBandFractionMixed: true, validSec: 180 });
      expect([merged.bandLeqDb(0), merged.octaveLeqDb(0), merged.bandExceedanceLevelDb(0, 50)]).toEqual([
        null,
        null,
        null,
      ]);
      expect(merged.laeqDb()).toBeCloseTo(50, 9);
    }
  });
});

test('distributions per band are gone when a part with bands lacks them', () => {
  const bands = { bandIndices: octave1k, levelsCentiDb: Int16Array.from([4000, 4000, 4000]) };
  const without = new PeriodAccumulator();
  without.add(interval(bands), true);
  const silent = new PeriodAccumulator();
  silent.add(interval(), true);
  const withClasses = gather(interval(bands));
  withClasses.merge(silent);
  expect(withClasses.sums.bandClasses?.bands[19]?.totalSec).toBe(60);
  withClasses.merge(without);
  expect(withClasses.sums.bandClasses).toBeNull();
  expect(withClasses.bandLeqDb(0)).toBeCloseTo(40, 9);
});

test('goes on from stored sums', () => {
  const first = gather(interval());
  const resumed = new PeriodAccumulator({ from: first.sums });
  resumed.add(interval({ laeqCentiDb: 6000 }), true);
  expect(resumed.laeqDb()).toBeCloseTo(10 * Math.log10((1e5 + 1e6) / 2), 9);
});
