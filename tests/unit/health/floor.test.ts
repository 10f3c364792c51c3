import { expect, test } from 'vitest';
import { floorsOf } from '#lib/services/health/floor';

const END_SEC = 1_780_001_100;

/** Quarter-hours of the 15 days before `END_SEC`, the newest last. */
function quarters(levelDb: (daysBefore: number, at: number) => number | null, hasMinimum = true) {
  return Array.from({ length: 15 * 96 }, (_, at) => {
    const daysBefore = Math.floor((15 * 96 - 1 - at) / 96);
    const level = levelDb(daysBefore, at);
    return {
      startSec: END_SEC - (15 * 96 - at) * 900,
      validSec: level === null ? 0 : 900,
      lafminCentiDb: hasMinimum && level !== null ? level * 100 : null,
      aEnergySec: level === null ? 0 : 900 * 10 ** (level / 10),
    };
  });
}

test('the quiet of a day is what its quietest tenth keeps below, by LAFmin or by LAeq', () => {
  const place = (_: number, at: number) => (at % 96 < 20 ? 30 : 50);
  for (const hasMinimum of [true, false]) {
    const { lastDay, usual } = floorsOf(quarters(place, hasMinimum), END_SEC);
    expect(lastDay).toBeCloseTo(30);
    expect(usual).toBeCloseTo(30);
  }
});

test('a dead microphone and a humming one shift the last day against the usual', () => {
  const shifted = (byDb: number) =>
    floorsOf(
      quarters((daysBefore, at) => (at % 96 < 20 ? 30 : 50) + (daysBefore === 0 ? byDb : 0)),
      END_SEC,
    );
  for (const byDb of [-15, 15]) {
    const { lastDay, usual } = shifted(byDb);
    expect((lastDay ?? 0) - (usual ?? 0)).toBeCloseTo(byDb);
  }
});

test('half a day, and fewer than three such days before, say nothing', () => {
  const short = quarters((daysBefore) => (daysBefore > 2 ? null : 40));
  expect(floorsOf(short, END_SEC)).toEqual({ lastDay: 40, usual: null });
  const gap = quarters((daysBefore, at) => (daysBefore === 0 && at % 96 > 40 ? null : 40));
  expect(floorsOf(gap, END_SEC).lastDay).toBeNull();
});
