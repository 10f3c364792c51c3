import { describe, expect, test } from 'vitest';
import { levelSet, meanDifference } from '#lib/acoustics/onOff';
import { sortQuarters } from '#lib/services/activities/sortQuarters';

const blocks = (levels: number[][]) =>
  levelSet(levels.flatMap((block, at) => block.map((levelDb) => ({ levelDb, block: at }))));

describe('sets of quarter-hour levels', () => {
  test('mean and spread; nothing of nothing', () => {
    expect(blocks([])).toEqual({ count: 0, blockCount: 0, meanDb: null, spreadDb: null, standardDb: null });
    const set = blocks([[50, 52], [54]]);
    expect(set).toMatchObject({ count: 3, blockCount: 2, meanDb: 52, standardDb: null });
    expect(set.spreadDb).toBeCloseTo(2, 12);
  });

  test('with one quarter-hour a block the uncertainty is that of a mean of independent values', () => {
    const levels = [50, 51, 52, 53, 54, 56];
    const { spreadDb, standardDb } = blocks(levels.map((levelDb) => [levelDb]));
    expect(standardDb).toBeCloseTo((spreadDb ?? 0) / Math.sqrt(6), 12);
  });

  test('repeating every level within its block adds no certainty', () => {
    const levels = [50, 51, 52, 53, 54];
    const once = blocks(levels.map((levelDb) => [levelDb]));
    const often = blocks(levels.map((levelDb) => Array<number>(20).fill(levelDb)));
    expect(often.standardDb).toBeCloseTo(once.standardDb ?? NaN, 12);
  });

  test('a difference has U = 2u, and none with too few blocks', () => {
    const on = blocks([[60], [61], [62], [61], [60]]);
    const off = blocks([[50], [51], [52], [51], [50]]);
    const { differenceDb, expandedDb } = meanDifference(on, off);
    expect(differenceDb).toBeCloseTo(10, 12);
    expect(expandedDb).toBeCloseTo(2 * Math.SQRT2 * (on.standardDb ?? NaN), 12);
    expect(meanDifference(on, blocks([[50], [51]])).expandedDb).toBeNull();
    expect(meanDifference(on, blocks([])).differenceDb).toBeNull();
  });
});

describe('sorting quarter-hours by an activity', () => {
  const sec = (text: string) => Date.parse(text) / 1000;
  const day = { fromSec: sec('2026-03-02T00:00:00Z'), toSec: sec('2026-03-04T00:00:00Z') };

  test('partly covered ones count on neither side, other hours are left out', () => {
    const activity = [{ fromSec: sec('2026-03-02T10:10:00Z'), toSec: sec('2026-03-02T11:00:00Z') }];
    const sorted = sortQuarters(day, activity, 'UTC');
    expect(sorted.on).toHaveLength(3);
    expect(sorted.partly).toBe(1);
    expect(sorted.off).toHaveLength(4);
    expect(sorted.otherHours).toBe(2 * 96 - 8);
  });

  test('a night is one occasion; a stretch of two days is two', () => {
    const night = [{ fromSec: sec('2026-03-02T22:00:00Z'), toSec: sec('2026-03-03T06:00:00Z') }];
    expect(new Set(sortQuarters(day, night, 'UTC').on.map(({ block }) => block)).size).toBe(1);
    expect(new Set(sortQuarters(day, [day], 'UTC').on.map(({ block }) => block)).size).toBe(2);
  });
});
