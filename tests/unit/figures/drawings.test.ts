import { describe, expect, test } from 'vitest';
import { chartRange } from '../../../src/components/figures/chartScale';
import { cellSpan, heatMapPaths } from '../../../src/components/figures/heatMapCells';
import { percentWords } from '../../../src/components/figures/figureWords';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import type { HourCell } from '#lib/contracts/figureSheet';
import { distributionOf } from '#lib/services/figures/distribution';

const cell = (hour: number, LAeq: number | null, more: Partial<HourCell> = {}): HourCell => ({
  date: '2026-10-25',
  hour,
  turn: 0,
  from: '',
  to: '',
  LAeq,
  coverage: LAeq === null ? 0 : 1,
  meetsMinimum: LAeq !== null,
  ...more,
});

describe('the heat map', () => {
  test('hatches gaps, dots thin hours, and never draws a gap as a level', () => {
    const cells = [cell(0, 50), cell(1, null), cell(2, 70, { meetsMinimum: false })];
    const paths = heatMapPaths([{ date: '2026-10-25', cells, skippedHours: [5] }], { lowDb: 50, highDb: 70 });
    const rectangles = (path: string) => path.split('z').length - 1;
    expect(paths.classes.reduce((sum, { path }) => sum + rectangles(path), 0)).toBe(2);
    expect([rectangles(paths.gaps), rectangles(paths.thin)]).toEqual([1, 1]);
    expect(paths.skipped).not.toBe('');
    expect(paths.classes.map(({ levelDb }) => levelDb)).toEqual([50.5, 69.5]);
  });

  test('gives the two hours of an autumn change one place', () => {
    const whole = cellSpan({ hour: 1, turn: 0 }, false);
    const [first, second] = [cellSpan({ hour: 1, turn: 0 }, true), cellSpan({ hour: 1, turn: 1 }, true)];
    expect(first.x).toBe(whole.x);
    expect(second.x + second.width).toBeCloseTo(whole.x + whole.width, 9);
    expect(first.x + first.width).toBeCloseTo(second.x, 9);
  });
});

test('a range of levels holds all of them in whole steps', () => {
  expect(chartRange([41.2, null, 58.9], 5, 15)).toEqual({ lowDb: 40, highDb: 60 });
  expect(chartRange([41.2], 5, 15)).toEqual({ lowDb: 40, highDb: 55 });
  expect(chartRange([null], 5, 15)).toBeNull();
});

test('a trace is not nothing', () => {
  expect([percentWords(0), percentWords(0.0001), percentWords(0.1234)]).toEqual([
    '0.0\u00a0%',
    '<0.1\u00a0%',
    '12.3\u00a0%',
  ]);
});

test('classes of 1 dB hold all of the time, also below zero, and the curve ends at nothing', () => {
  const counts = new LevelClassCounts();
  for (const [tenths, sec] of [
    [-15, 60],
    [-10, 60],
    [9, 120],
    [19, 60],
  ] as const) {
    counts.addTenths(tenths, sec);
  }
  const distribution = distributionOf(counts, 60);
  expect(distribution?.classes).toEqual([
    { fromDb: -2, share: 0.2 },
    { fromDb: -1, share: 0.2 },
    { fromDb: 0, share: 0.4 },
    { fromDb: 1, share: 0.2 },
  ]);
  expect(distribution?.cumulative.at(-1)).toEqual({ levelDb: 1.9, exceededShare: 0 });
  expect(distribution?.cumulative[0]).toEqual({ levelDb: -1.5, exceededShare: 0.8 });
  // Five samples are too few for any exceedance level but the median's six.
  expect(distribution?.marks).toEqual([]);
});
