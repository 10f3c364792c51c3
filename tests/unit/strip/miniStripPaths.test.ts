import { expect, test } from 'vitest';
import { miniStripPaths, traceY, xOf } from '#components/strip/mini/miniStripPaths.ts';
import type { WindowStrip } from '#lib/contracts/windowStrip';

const strip: WindowStrip = {
  fromSec: 0,
  stepSec: 60,
  windowFromSec: 60,
  windowToSec: 180,
  laeqDb: [40, null, 42, 61],
  isValid: [true, false, false, true],
  bandsHz: [63, 125],
  bandLevelsDb: [
    [30, 31],
    [null, null],
    [30, null],
    [75, 31],
  ],
};

const rectangles = (path: string) => path.match(/M[^M]*z/g) ?? [];

test('every measured band has one cell, and a gap has none', () => {
  const paths = miniStripPaths(strip);
  const cells = paths?.cells.flatMap(({ path }) => rectangles(path)) ?? [];
  expect(cells).toHaveLength(5);
  const gapX = xOf(strip, 60);
  expect(cells.some((cell) => cell.startsWith(`M${gapX} `))).toBe(false);
  expect(rectangles(paths?.gaps ?? '')).toHaveLength(1);
  expect(paths?.gaps.startsWith(`M${gapX} `)).toBe(true);
});

test('the trace breaks at the gap, and what does not count is marked', () => {
  const paths = miniStripPaths(strip);
  expect(paths?.trace.match(/M/g)).toHaveLength(2);
  expect(paths?.excluded.startsWith(`M${xOf(strip, 120)} `)).toBe(true);
  expect(rectangles(paths?.excluded ?? '')).toHaveLength(1);
});

test('louder is higher, and the ranges hold every level without a quiet night taking a loud one’s colours', () => {
  const paths = miniStripPaths(strip);
  expect(paths?.bandRange).toEqual({ lowDb: 30, highDb: 80 });
  expect(paths?.traceRange).toEqual({ lowDb: 40, highDb: 65 });
  const range = { lowDb: 40, highDb: 65 };
  expect(traceY(range, 61)).toBeLessThan(traceY(range, 42));
});

test('nothing measured at all draws nothing', () => {
  const silent = { ...strip, laeqDb: strip.laeqDb.map(() => null) };
  expect(miniStripPaths(silent)).toBeNull();
});
