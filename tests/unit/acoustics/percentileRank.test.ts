import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { percentileRank } from '#lib/acoustics/percentileRank';

describe('percentile rank', () => {
  // SciPy's documentation of stats.percentileofscore(…, kind='mean'): [1, 2, 3, 3, 4] and 3 give 60.
  test('agrees with a published example', () => {
    expect(percentileRank(3, [1, 2, 3, 3, 4])).toBe(60);
  });

  test('is the mean of the strict and the weak rank, whatever the values', () => {
    const level = fc.integer({ min: 200, max: 900 }).map((tenths) => tenths / 10);
    fc.assert(
      fc.property(level, fc.array(level, { minLength: 1, maxLength: 60 }), (asked, others) => {
        const strict = others.filter((other) => other < asked).length / others.length;
        const weak = others.filter((other) => other <= asked).length / others.length;
        expect(percentileRank(asked, others)).toBeCloseTo(50 * (strict + weak), 9);
      }),
    );
  });

  test('levels that are shown alike are ties, and among none there is no rank', () => {
    expect(percentileRank(43.149, [43.05, 43.14])).toBe(50);
    expect(percentileRank(50, [])).toBeNull();
  });
});
