import { describe, expect, test } from 'vitest';
import {
  adjustmentProblem,
  compareWithBackground,
  onTimeCorrectedDb,
  ratingLevel,
} from '#lib/acoustics/ratingLevel';

describe('rating level', () => {
  test('without adjustments it is the specific level', () => {
    expect(ratingLevel(46.7, []).ratingDb).toBe(46.7);
  });

  test.each([
    [{ kind: 'tonal', adjustmentDb: 6.1, reason: 'hum' }],
    [{ kind: 'impulsive', adjustmentDb: 9.5, reason: 'bangs' }],
    [{ kind: 'tonal', adjustmentDb: -1, reason: 'hum' }],
    [{ kind: 'tonal', adjustmentDb: NaN, reason: 'hum' }],
    [{ kind: 'tonal', adjustmentDb: 4, reason: '  ' }],
  ] as const)('%o is refused', (adjustment) => {
    expect(adjustmentProblem(adjustment)).not.toBeNull();
    expect(() => ratingLevel(46.7, [adjustment])).toThrow(RangeError);
  });

  test('one adjustment of a kind', () => {
    const hum = { kind: 'tonal', adjustmentDb: 2, reason: 'hum' } as const;
    expect(() => ratingLevel(46.7, [hum, hum])).toThrow(RangeError);
    expect(
      ratingLevel(46.7, [hum, { kind: 'impulsive', adjustmentDb: 9, reason: 'bangs' }]).ratingDb,
    ).toBeCloseTo(57.7, 9);
  });

  test.each([
    [-3, 'low-impact'],
    [0.49, 'low-impact'],
    [0.5, 'less-likely'],
    [4.49, 'less-likely'],
    [4.5, 'adverse'],
    [9.49, 'adverse'],
    [9.5, 'significantly-adverse'],
  ] as const)('%d dB over the background: %s', (excessDb, verdict) => {
    expect(compareWithBackground(40 + excessDb, 40).verdict).toBe(verdict);
  });

  test('a quarter of the time is 6 dB less', () => {
    expect(onTimeCorrectedDb(50, 900, 3600)).toBeCloseTo(43.9794, 4);
    expect(onTimeCorrectedDb(50, 3600, 3600)).toBe(50);
    expect(() => onTimeCorrectedDb(50, 0, 3600)).toThrow(RangeError);
    expect(() => onTimeCorrectedDb(50, 3601, 3600)).toThrow(RangeError);
  });
});
