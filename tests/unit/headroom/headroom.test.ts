import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { energyOfDb } from '#lib/acoustics/energy';
import { headingDb, headroomDb, isCertainToPass, secondsUntilCertain } from '#lib/acoustics/headroom';
import { toTenths } from '#lib/acoustics/rounding';

const tenths = fc.integer({ min: 200, max: 1200 });
const windows = fc
  .record({
    meanDb: fc.double({ min: 10, max: 130, noNaN: true }),
    validSec: fc.integer({ min: 0, max: 40_000 }),
    restSec: fc.integer({ min: 1, max: 40_000 }),
  })
  .map(({ meanDb, validSec, restSec }) => ({
    energySec: energyOfDb(meanDb) * validSec,
    validSec,
    restSec,
  }));

describe('headroom of an open window', () => {
  test('a rest that stays at it ends the window at the limit, and does not pass it', () => {
    fc.assert(
      fc.property(tenths, windows, (thresholdTenths, soFar) => {
        const levelDb = headroomDb(thresholdTenths, soFar);
        if (levelDb === null) return;
        const endDb = headingDb(soFar, levelDb) ?? NaN;
        expect(Math.abs(endDb - thresholdTenths / 10)).toBeLessThanOrEqual(0.05);
        expect(toTenths(endDb)).toBe(thresholdTenths);
      }),
    );
  });

  test('there is none just when the window is certain to pass', () => {
    fc.assert(
      fc.property(tenths, windows, (thresholdTenths, soFar) => {
        const isCertain = isCertainToPass(thresholdTenths, soFar);
        // Within the slack of the edge either may be said.
        const endDb = headingDb(soFar, -300) ?? NaN;
        fc.pre(Math.abs(endDb * 10 - thresholdTenths - 0.5) > 1e-4);
        expect(headroomDb(thresholdTenths, soFar) === null).toBe(isCertain);
      }),
    );
  });

  test('without data it is the limit itself', () => {
    expect(headroomDb(453, { energySec: 0, validSec: 0, restSec: 900 })).toBeCloseTo(45.3, 9);
  });

  test('half an hour at the limit less 10 dB leaves the other half 2.8 dB above it', () => {
    // 10 lg(2 − 0.1) = 2.7875 dB, by hand.
    const soFar = { energySec: energyOfDb(50) * 1800, validSec: 1800, restSec: 1800 };
    expect(headroomDb(600, soFar)).toBeCloseTo(62.7875, 4);
  });

  test('half an hour 3.06 dB above the limit is certain to pass, 3.05 dB is not yet', () => {
    const at = (db: number) => ({ energySec: energyOfDb(db) * 1800, validSec: 1800, restSec: 1800 });
    expect(isCertainToPass(600, at(63.07))).toBe(true);
    expect(isCertainToPass(600, at(63.05))).toBe(false);
    expect(headroomDb(600, at(63.07))).toBeNull();
  });

  test('when nothing is left there is no headroom', () => {
    expect(headroomDb(600, { energySec: 0, validSec: 900, restSec: 0 })).toBeNull();
    expect(headroomDb(600, { energySec: 0, validSec: 0, restSec: 0 })).toBeNull();
  });

  test('the moment of certainty: before it a silent rest saves the window, after it nothing does', () => {
    fc.assert(
      fc.property(
        tenths,
        windows,
        fc.double({ min: 10, max: 130, noNaN: true }),
        (threshold, soFar, steadyDb) => {
          const sec = secondsUntilCertain(threshold, soFar, steadyDb);
          fc.pre(sec !== null && sec > 0.01);
          const after = (measuredSec: number) => ({
            energySec: soFar.energySec + energyOfDb(steadyDb) * measuredSec,
            validSec: soFar.validSec + measuredSec,
            restSec: soFar.restSec - measuredSec,
          });
          expect(isCertainToPass(threshold, after((sec ?? NaN) * (1 + 1e-6)))).toBe(true);
          expect(isCertainToPass(threshold, after((sec ?? NaN) * (1 - 1e-6) - 0.001))).toBe(false);
        },
      ),
    );
  });
});
