import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

function countsOf(...levels: [tenths: number, sec: number][]): LevelClassCounts {
  const counts = new LevelClassCounts();
  for (const [tenths, sec] of levels) counts.addTenths(tenths, sec);
  return counts;
}

describe('class counts', () => {
  test('levels go to the class of their tenths, half up', () => {
    const counts = new LevelClassCounts();
    counts.add(4995, 60);
    counts.add(5004, 60);
    counts.add(5005, 60);
    counts.add(-6, 1);
    expect([...counts.entries()]).toEqual([
      [-1, 1],
      [500, 120],
      [501, 60],
    ]);
    expect(counts.totalSec).toBe(181);
  });

  test('the ends of the range, far apart, in any order', () => {
    const counts = countsOf([2048, 1], [-300, 2], [500, 3], [501, 0]);
    expect([...counts.entries()]).toEqual([
      [-300, 2],
      [500, 3],
      [2048, 1],
    ]);
  });

  test('what is no class or no duration is refused', () => {
    const counts = new LevelClassCounts();
    expect(() => counts.add(NO_LEVEL_CENTI_DB, 60)).toThrow(RangeError);
    expect(() => counts.addTenths(2049, 1)).toThrow(RangeError);
    expect(() => counts.addTenths(-301, 1)).toThrow(RangeError);
    expect(() => counts.addTenths(500.5, 1)).toThrow(RangeError);
    expect(() => counts.addTenths(500, 0.5)).toThrow(RangeError);
    expect(() => counts.addTenths(500, -1)).toThrow(RangeError);
    expect(counts.totalSec).toBe(0);
  });

  test('the smallest level that is exceeded for no more than N % of the time', () => {
    const counts = countsOf([400, 90], [500, 10]);
    expect(counts.exceededTenths(10)).toBe(400);
    expect(counts.exceededTenths(9.99)).toBe(500);
    expect(countsOf([400, 1]).exceededTenths(99)).toBe(400);
    expect(new LevelClassCounts().exceededTenths(50)).toBeNull();
  });

  test.each([0, 100, -1, NaN])('%d % is refused', (percent) => {
    expect(() => countsOf([400, 1]).exceededTenths(percent)).toThrow(RangeError);
  });

  test.each([
    [1, 300],
    [5, 60],
    [10, 30],
    [50, 6],
    [90, 30],
    [95, 60],
    [99, 300],
  ])('L%d needs %d samples', (percent, samples) => {
    const sampleSec = 60;
    expect(countsOf([400, samples * sampleSec]).exceedanceLevelDb(percent, sampleSec)).toBe(40);
    expect(countsOf([400, samples * sampleSec - 1]).exceedanceLevelDb(percent, sampleSec)).toBeNull();
  });

  test('mixed sample lengths have no L_N; nor has nothing', () => {
    expect(countsOf([400, 86_400]).exceedanceLevelDb(50, null)).toBeNull();
    expect(new LevelClassCounts().exceedanceLevelDb(50, 60)).toBeNull();
  });

  test('merging leaves the other as it was', () => {
    const [a, b] = [countsOf([400, 1]), countsOf([400, 2], [900, 3])];
    a.merge(b);
    a.merge(new LevelClassCounts());
    expect([...a.entries()]).toEqual([
      [400, 3],
      [900, 3],
    ]);
    expect(a.totalSec).toBe(6);
    expect([...b.entries()]).toEqual([
      [400, 2],
      [900, 3],
    ]);
  });

  test('encoded: known bytes, the same whatever the history', () => {
    // 2 classes: −30.0 dB (step 0) for 5 s, then 70.0 dB (step 1000 = 0xE8 0x07) for 300 s (0xAC 0x02).
    const bytes = [2, 0, 5, 0xe8, 0x07, 0xac, 0x02];
    expect([...countsOf([-300, 5], [700, 300]).encode()]).toEqual(bytes);
    expect([...countsOf([700, 100], [2000, 0], [-300, 5], [700, 200]).encode()]).toEqual(bytes);
    expect([...new LevelClassCounts().encode()]).toEqual([0]);
  });

  test('encoded: a dense run where most classes occur, of known bytes', () => {
    // Mark, unit 60 s, 70.0 dB = class 1000 above −30.0 dB (0xE8 0x07), 4 classes, 1 byte each: 1, 0, 2, 1 minutes.
    const bytes = [0, 60, 0xe8, 0x07, 4, 1, 1, 0, 2, 1];
    const counts = countsOf([700, 60], [702, 120], [703, 60]);
    expect([...counts.encode()]).toEqual(bytes);
    // Two bytes where one does not hold 300 units: 300 = 0x2C 0x01.
    expect([...countsOf([700, 300], [701, 1]).encode()]).toEqual([
      0, 1, 0xe8, 0x07, 2, 2, 0x2c, 0x01, 0x01, 0x00,
    ]);
    expect([...LevelClassCounts.decode(Uint8Array.from(bytes)).entries()]).toEqual([...counts.entries()]);
  });

  test('lists and dense runs tell the same, and merge alike', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.tuple(
            fc.integer({ min: -300, max: 2048 }),
            fc.oneof(fc.constant(60), fc.integer({ min: 0, max: 4e9 })),
          ),
        ),
        fc.array(fc.tuple(fc.integer({ min: 400, max: 420 }), fc.integer({ min: 0, max: 300 })), {
          maxLength: 40,
        }),
        (sparse, dense) => {
          const [a, b] = [countsOf(...sparse), countsOf(...dense)];
          const merged = countsOf(...sparse, ...dense);
          const read = new LevelClassCounts();
          read.merge(LevelClassCounts.encoded(a.encode()));
          read.merge(LevelClassCounts.encoded(b.encode()));
          expect([...read.entries()]).toEqual([...merged.entries()]);
          expect(read.totalSec).toBe(merged.totalSec);
          expect(read.encode()).toEqual(merged.encode());
        },
      ),
    );
  });

  test.each([
    ['dense, cut short', [0, 60, 5, 3, 1, 1, 1]],
    ['dense, trailing byte', [0, 60, 5, 1, 1, 1, 1]],
    ['dense, no unit', [0, 0, 5, 1, 1, 1]],
    ['dense, no classes', [0, 60, 5, 0, 1]],
    ['dense, unknown width', [0, 60, 5, 1, 3, 1, 1, 1]],
    ['dense, out of range', [0, 60, 0xff, 0x7f, 1, 1, 1]],
    ['cut short', [2, 0, 5]],
    ['empty', []],
    ['trailing byte', [0, 1]],
    ['class without time', [1, 5, 0]],
    ['class twice', [2, 5, 1, 0, 1]],
    ['class out of range', [1, 0xff, 0x7f, 1]],
    ['endless number', [1, ...new Array<number>(12).fill(0xff)]],
  ])('bytes that encode did not make are refused: %s', (_, bytes) => {
    expect(() => LevelClassCounts.decode(Uint8Array.from(bytes))).toThrow(RangeError);
  });

  test('a century of seconds in one class survives encoding', () => {
    const counts = countsOf([650, 100 * 366 * 86_400]);
    expect(LevelClassCounts.decode(counts.encode()).totalSec).toBe(3_162_240_000);
  });
});
