import { describe, expect, test } from 'vitest';
import { coverageUncertaintyDb, periodUncertainty } from '#lib/acoustics/uncertainty';

describe('coverage term', () => {
  test('4.34·s/(Ē·√n)·√(1 − c), worked by hand', () => {
    // Energies 1, 2, 3: mean 2, s = 1, n = 3; c = 0.75. 4.3429·1/(2·1.7321)·0.5 = 0.62685.
    expect(coverageUncertaintyDb([1, 2, 3], 0.75)).toBeCloseTo(0.62685, 5);
  });

  test('full coverage leaves nothing; even hours leave nothing; one hour tells nothing', () => {
    expect(coverageUncertaintyDb([1, 2, 3], 1)).toBe(0);
    expect(coverageUncertaintyDb([], 1)).toBe(0);
    expect(coverageUncertaintyDb([5, 5, 5], 0.5)).toBe(0);
    expect(coverageUncertaintyDb([5], 0.5)).toBeNull();
    expect(coverageUncertaintyDb([], 0)).toBeNull();
    expect(() => coverageUncertaintyDb([1, 2], 1.01)).toThrow(RangeError);
    expect(() => coverageUncertaintyDb([1, 2], NaN)).toThrow(RangeError);
  });
});

test('the terms of a period combine as root sum of squares; U = 2u', () => {
  expect(periodUncertainty({ instrumentDb: 0.5, driftDb: -0.3, coverageDb: 0.4 })).toEqual({
    uDb: expect.closeTo(Math.sqrt(0.5), 9),
    expandedDb: expect.closeTo(2 * Math.sqrt(0.5), 9),
    terms: { instrumentDb: 0.5, driftDb: 0.3, coverageDb: 0.4 },
  });
  expect(periodUncertainty({ instrumentDb: 0.5, driftDb: 0, coverageDb: null })).toBeNull();
});
