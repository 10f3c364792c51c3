import { describe, expect, test } from 'vitest';
import { findEvents, type EventInterval } from '#lib/acoustics/events';
import { interval } from './support/intervals';

const rules = { thresholdTenths: 600, minimumSec: 2, bridgedGapSec: 2 };

/** One-second intervals from 1000 on; null is a second without data, a text one that does not count. */
function seconds(levelsDb: (number | null | 'excluded')[]): EventInterval[] {
  return levelsDb.flatMap((levelDb, i) => {
    if (levelDb === null) return [];
    const isValid = levelDb !== 'excluded';
    const laeqCentiDb = levelDb === 'excluded' ? 9900 : Math.round(levelDb * 100);
    const one = interval({ durationSec: 1, sampleSec: 1, laeqCentiDb, lafmaxCentiDb: laeqCentiDb + 200 });
    return [{ ...one, startSec: 1000 + i, isValid }];
  });
}

function spans(levelsDb: (number | null | 'excluded')[]): [number, number][] {
  return findEvents(seconds(levelsDb), rules).map((event) => [event.fromSec - 1000, event.toSec - 1000]);
}

describe('events', () => {
  test('runs strictly above the threshold, in tenths, of at least the minimum length', () => {
    expect(spans([50, 60.1, 60.1, 50])).toEqual([[1, 3]]);
    expect(spans([50, 60.05, 60.05, 50])).toEqual([[1, 3]]);
    expect(spans([50, 60.04, 60.04, 50])).toEqual([]);
    expect(spans([50, 70, 50, 50, 50, 70, 50])).toEqual([]);
    expect(spans([])).toEqual([]);
  });

  test('gaps up to the tolerance are bridged, quieter, missing or excluded; longer ones are not', () => {
    expect(spans([70, 50, 50, 70])).toEqual([[0, 4]]);
    expect(spans([70, null, null, 70])).toEqual([[0, 4]]);
    expect(spans([70, 'excluded', 50, 70])).toEqual([[0, 4]]);
    expect(spans([70, 70, 50, 50, 50, 70, 70])).toEqual([
      [0, 2],
      [5, 7],
    ]);
    expect(spans([70, 70, null, null, null, 70, 70])).toEqual([
      [0, 2],
      [5, 7],
    ]);
  });

  test('an event ends with its last loud interval; quiet ones after it add nothing', () => {
    const [event] = findEvents(seconds([50, 70, 70, 50, 50]), rules);
    expect(event?.figures.sums.validSec).toBe(2);
    expect(event?.figures.laeDb()).toBeCloseTo(70 + 10 * Math.log10(2), 9);
    expect(event?.figures.sums.lafmaxCentiDb).toBe(7200);
  });

  test('a bridged gap’s valid energy counts, excluded seconds do not', () => {
    const [event] = findEvents(seconds([70, 50, 'excluded', 70]), rules);
    expect(event?.figures.sums).toMatchObject({ validSec: 3, excludedSec: 1 });
    expect(event?.figures.laeDb()).toBeCloseTo(10 * Math.log10(2e7 + 1e5), 9);
  });

  test('intervals out of order are refused', () => {
    expect(() => findEvents(seconds([70, 70]).reverse(), rules)).toThrow(RangeError);
  });
});
