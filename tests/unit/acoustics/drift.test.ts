import { describe, expect, test } from 'vitest';
import { judgeDrift, median, relativeToNeighbours } from '#lib/acoustics/drift';

const BOUND_DB = 1.5;
const DAYS = 182;

/** Normal noise that is the same at every run. */
function noiseOf(seed: number): () => number {
  let state = seed;
  const uniform = () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return (((mixed ^ (mixed >>> 14)) >>> 0) + 0.5) / 4_294_967_296;
  };
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** Night backgrounds of four stations: one weather, each its own level and noise; some nights are missing. */
function stations(change: (station: number, day: number) => number, seed = 1): (number | null)[][] {
  const noise = noiseOf(seed);
  const weather = Array.from({ length: DAYS }, (_, day) => 2 * noise() + 3 * Math.sin(day / 40));
  return [31, 38, 42, 35].map((level, station) =>
    weather.map((common, day) => {
      const own = level + common + 0.3 * noise() + change(station, day);
      return noise() > 1.3 ? null : own;
    }),
  );
}

const verdictOn = (series: (number | null)[][], station: number, days: number) =>
  judgeDrift(
    relativeToNeighbours(
      (series[station] ?? []).slice(0, days),
      series.filter((_, at) => at !== station).map((other) => other.slice(0, days)),
    ),
    BOUND_DB,
  );

describe('one of four drifts by 0.1 dB a day', () => {
  const FROM_DAY = 120;
  const drift = (station: number, day: number) => (station === 2 ? -0.1 * Math.max(0, day - FROM_DAY) : 0);

  test.each([1, 2, 3, 4, 5])(
    'it is told before it has reached 1.5 bounds, and the others are not (%i)',
    (seed) => {
      const series = stations(drift, seed);
      const toldDay = Array.from({ length: DAYS }, (_, day) => day + 1).find(
        (days) => verdictOn(series, 2, days).state === 'drifting',
      );
      const driftedDb = 0.1 * ((toldDay ?? Infinity) - 1 - FROM_DAY);
      expect(driftedDb).toBeGreaterThan(0.5 * BOUND_DB);
      expect(driftedDb).toBeLessThan(1.5 * BOUND_DB);
      for (const other of [0, 1, 3]) {
        for (let days = 60; days <= FROM_DAY + 40; days += 1) {
          expect(verdictOn(series, other, days).state, `station ${other}, day ${days}`).not.toBe('drifting');
        }
      }
    },
  );

  test('so is one that is too slow for a step, by its slope', () => {
    const slow = stations((station, day) => (station === 0 ? 0.015 * day : 0));
    const verdict = verdictOn(slow, 0, DAYS);
    expect(verdict).toMatchObject({ state: 'drifting', by: 'slope' });
    expect(verdict.slopeDbPerDay).toBeCloseTo(0.015, 2);
  });
});

test.each([1, 2, 3])('no station is told of when all rise together (%i)', (seed) => {
  const series = stations((_, day) => 0.1 * Math.max(0, day - 90), seed);
  for (let days = 60; days <= DAYS; days += 1) {
    for (const station of [0, 1, 2, 3]) expect(verdictOn(series, station, days).state).not.toBe('drifting');
  }
});

test('an adjustment begins a new baseline', () => {
  const series = Array.from({ length: 100 }, (_, day) => (day < 90 ? 0 : 4) + (day % 2) / 10);
  expect(judgeDrift(series, BOUND_DB)).toMatchObject({ state: 'drifting', by: 'step' });
  expect(judgeDrift(series, BOUND_DB, 90).state).toBe('unknown');
});

test('too little says nothing, and gaps of weeks do no harm', () => {
  expect(judgeDrift([], BOUND_DB)).toMatchObject({ state: 'unknown', changeDb: null });
  expect(
    judgeDrift(
      Array.from({ length: 20 }, () => 1),
      BOUND_DB,
    ).state,
  ).toBe('unknown');
  const gappy = Array.from({ length: 70 }, (_, day) => (day > 20 && day < 45 ? null : day % 3));
  expect(judgeDrift(gappy, BOUND_DB).state).toBe('fine');
  expect(relativeToNeighbours([1, 2], [[1, 2]])).toEqual([null, null]);
  expect(median([])).toBeNull();
  expect(median([4, 1, 3, 2])).toBe(2.5);
});
