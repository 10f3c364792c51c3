import { describe, expect, test } from 'vitest';
import { centiDbToDb, centiDbToTenths, roundHalfUp, toCentiDb, toTenths } from '#lib/acoustics/rounding';

describe('rounding half up', () => {
  test.each([
    [0.05, 1],
    [0.15, 2],
    [0.25, 3],
    [8.35, 84],
    [64.45, 645],
    [64.449, 644],
    [-0.05, 0],
    [-0.06, -1],
    [-0.15, -1],
    [0, 0],
  ])('%d dB is %d tenths', (levelDb, tenths) => expect(toTenths(levelDb)).toBe(tenths));

  test('a half that logarithms put a hair below still goes up', () => {
    expect(toTenths(10 * Math.log10(10 ** 6.005))).toBe(601);
    expect(toTenths(60.05 - 1e-12)).toBe(601);
    expect(toTenths(60.05 - 1e-6)).toBe(600);
  });

  test.each([
    [5, 1],
    [4, 0],
    [-4, 0],
    [-5, 0],
    [-6, -1],
    [-15, -1],
    [-16, -2],
    [6445, 645],
  ])('%d hundredths are %d tenths', (centiDb, tenths) => {
    expect(centiDbToTenths(centiDb)).toBe(tenths);
    expect(toTenths(centiDb / 100)).toBe(tenths);
  });

  test('hundredths of a dB there and back, over the whole stored range', () => {
    for (let centiDb = -3000; centiDb <= 20000; centiDb += 1) {
      if (
        toCentiDb(centiDbToDb(centiDb)) !== centiDb ||
        toTenths(centiDb / 100) !== centiDbToTenths(centiDb)
      ) {
        expect.fail(`${centiDb} hundredths`);
      }
    }
    expect(toCentiDb(1.005)).toBe(101);
  });

  test('never −0', () => {
    for (const value of [-0.04, -0, 0]) expect(Object.is(roundHalfUp(value, 1), 0)).toBe(true);
  });
});
