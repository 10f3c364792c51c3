import { expect, test } from 'vitest';
import { valueScale } from '../../../src/components/plots/valueScale';
import { suggestedEpisodes, suggestedShiftSec } from '#lib/services/clockShifts/offsets';

const FIRST_SEC = Date.parse('2026-03-03T00:00:00Z') / 1000;

/** A day of quarter-hours: slow by an hour from 11:00 to 15:00 of our time, else right to the way of a post. */
const OFFSETS = Array.from({ length: 96 }, (_, at) => ({
  quarterStartSec: FIRST_SEC + at * 900,
  aheadSec: (at >= 44 && at < 60 ? -3600 : 0) - 0.2 - (at % 4) / 10,
}));

test('a stretch of wrong times is suggested in the time of the monitor', () => {
  expect(suggestedEpisodes(OFFSETS, 60)).toEqual([
    {
      fromSec: FIRST_SEC + 10 * 3600,
      toSec: FIRST_SEC + 14 * 3600,
      shiftSec: 3600,
      receivedFromSec: FIRST_SEC + 11 * 3600,
    },
  ]);
  expect(suggestedEpisodes(OFFSETS, 7200)).toEqual([]);
});

test('the shift of a typed period is the median of what was measured in it', () => {
  const episode = { fromSec: FIRST_SEC + 12 * 3600, toSec: FIRST_SEC + 14 * 3600 };
  expect(suggestedShiftSec(OFFSETS.slice(44, 60), episode)).toBe(3600);
  expect(suggestedShiftSec([], episode)).toBeNull();
});

test('a scale has round steps and holds zero', () => {
  expect(valueScale([0.4, 2.3], 2)).toEqual({ low: 0, high: 2.5, ticks: [0, 0.5, 1, 1.5, 2, 2.5] });
  expect(valueScale([-3600, 5], 10)).toMatchObject({ low: -4000, high: 1000 });
});
