import { describe, expect, test } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { DEFAULT_SCHEME, ldenDb } from '#lib/acoustics/dayEveningNight';
import { energyMeanDb } from '#lib/acoustics/energy';
import { incidentLevel } from '#lib/acoustics/facade';
import { octavesFromThirdsDb } from '#lib/acoustics/octaves';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { roundHalfUp, toTenths } from '#lib/acoustics/rounding';
import { surveyTones, tonalThresholdTenths } from '#lib/acoustics/tonality';
import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { addDays } from '#lib/time/zone';
import { periodsOf } from '#lib/time/periods';
import { expectNear, present, readJson } from './support/fixtures';
import { LondonQuarters, MONTHS, minutesBetween, readLondonMinutes, sec, ZONE } from './support/london';
import { expected } from './support/londonExpected';

/** Mistakes of the field with the size of their error: made here on purpose, to see that the core does not make them. */
const pitfalls =
  readJson<{ id: string; what: string; size: string; rule: string }[]>('reference/pitfalls.json');
const minutes = readLondonMinutes();
const quarters = new LondonQuarters(minutes);
const march = MONTHS['2026-03'];
const marchFigures = quarters.between(march.fromSec, march.toSec);
const marchMinutes = minutesBetween(minutes, march.fromSec, march.toSec);

/** Whether the text of a pitfall prints a figure: the mistake is the one that the file means. */
function expectPrinted(id: string, ...figures: string[]): void {
  const { size } = present(
    pitfalls.find((pitfall) => pitfall.id === id),
    id,
  );
  for (const figure of figures) expect(size).toContain(figure);
}

/** Lden of the days of a month, with their periods taken by the clock of `zone`. */
function ldenOf(month: string, zone: string): { pooled: number; daily: number[] } {
  const pooled = {
    day: new PeriodAccumulator(),
    evening: new PeriodAccumulator(),
    night: new PeriodAccumulator(),
  };
  const daily: number[] = [];
  for (let date = `${month}-01`; date.startsWith(month); date = addDays(date, 1)) {
    const levels = { day: null, evening: null, night: null } as Record<
      'day' | 'evening' | 'night',
      number | null
    >;
    for (const { kind, fromSec, toSec } of periodsOf(date, DEFAULT_SCHEME, zone)) {
      const figures = quarters.between(fromSec, toSec);
      levels[kind] = figures.laeqDb();
      pooled[kind].merge(figures);
    }
    daily.push(...[ldenDb(DEFAULT_SCHEME, levels)].filter((levelDb) => levelDb !== null));
  }
  const { day, evening, night } = pooled;
  const levels = { day: day.laeqDb(), evening: evening.laeqDb(), night: night.laeqDb() };
  return { pooled: present(ldenDb(DEFAULT_SCHEME, levels)), daily };
}

function arithmeticMean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

describe('mistakes that the core does not make (fixtures/reference/pitfalls.json)', () => {
  test('arithmetic-dB: the mean of decibels is 6.6 dB too low in March', () => {
    const levels = marchMinutes
      .filter(({ isValid }) => isValid)
      .map(({ interval }) => interval.laeqCentiDb / 100);
    expectNear(arithmeticMean(levels), 58.63, 0.015);
    expect(roundHalfUp(present(marchFigures.laeqDb()), 2)).toBe(65.25);
    expectPrinted('arithmetic-dB', '58.63', '65.25');
  });

  test('lden-average: neither mean of the daily Lden is the month’s', () => {
    const { pooled, daily } = ldenOf('2026-03', ZONE);
    expectNear(pooled, expected.months['2026-03'].Lden_evening_dated, 1e-5);
    expect(pooled - arithmeticMean(daily)).toBeGreaterThan(0.1);
    expect(Math.abs(pooled - present(energyMeanDb(daily)))).toBeGreaterThan(0.01);
  });

  test('ln-of-leq: L10 and L90 of hourly levels are not those of the minutes', () => {
    const hourly = new PeriodAccumulator();
    for (let at = march.fromSec; at < march.toSec; at += 3600) {
      const levelDb = quarters.between(at, at + 3600).laeqDb();
      if (levelDb !== null) hourly.sums.aClasses.addTenths(toTenths(levelDb), 3600);
    }
    expectNear(hourly.sums.aClasses.exceedanceLevelDb(10, 3600), 68.74, 0.051);
    expectNear(hourly.sums.aClasses.exceedanceLevelDb(90, 3600), 49.82, 0.051);
    expect(marchFigures.exceedanceLevelDb(10)).toBe(65.7);
    expect(marchFigures.exceedanceLevelDb(90)).toBe(48.5);
    expectPrinted('ln-of-leq', '68.74', '65.7', '49.82', '48.5');
  });

  test('dst: periods by the UTC clock in April are 0.94 dB off', () => {
    expect(roundHalfUp(ldenOf('2026-04', 'UTC').pooled, 1)).toBe(69.4);
    expectNear(ldenOf('2026-04', ZONE).pooled, expected.months['2026-04'].Lden_evening_dated, 1e-5);
    expectPrinted('dst', '69.43', '68.49');
  });

  test('partial-coverage: half an hour missing is not half an hour of silence', () => {
    const half = quarters.between(sec('2026-03-01T08:00Z'), sec('2026-03-01T08:30Z'));
    const asSilence = 10 * Math.log10(half.sums.aEnergySec / 3600);
    expect(asSilence - present(half.laeqDb())).toBeCloseTo(-3.0103, 4);
    expectPrinted('partial-coverage', '-3.01');
  });

  test.each([
    ['2026-03', 1.01],
    ['2026-04', 0.87],
  ] as const)('flagged-rows: left in, %s would be %s dB louder', (month, tooLoudDb) => {
    const withAll = new PeriodAccumulator();
    for (const { interval } of minutesBetween(minutes, MONTHS[month].fromSec, MONTHS[month].toSec)) {
      withAll.add(interval, true);
    }
    const figures = quarters.between(MONTHS[month].fromSec, MONTHS[month].toSec);
    expect(roundHalfUp(present(withAll.laeqDb()) - present(figures.laeqDb()), 2)).toBe(tooLoudDb);
    expect(figures.sums.validSec + figures.sums.excludedSec).toBe(withAll.sums.validSec);
    expectPrinted('flagged-rows', String(tooLoudDb));
  });

  test('a-twice and a-from-octaves: one level, from thirds, weighted once', () => {
    const thirds = bandsOf(3).filter((band) => marchFigures.bandLeqDb(band.index) !== null);
    const levelsDb = thirds.map((band) => marchFigures.bandLeqDb(band.index));
    const fromThirds = present(levelFromBandsDb(levelsDb, thirds, 'A'));
    const octaves = octavesFromThirdsDb(levelsDb, thirds);
    const fromOctaves = present(levelFromBandsDb(octaves.levelsDb, octaves.bands, 'A'));
    const { LAeq_analytic, wrong_A_twice } = expected.months['2026-03'].from_bands;
    expectNear(fromThirds, LAeq_analytic, 1e-4);
    expect(fromThirds - wrong_A_twice).toBeGreaterThan(0.9);
    expect(fromOctaves - fromThirds).toBeGreaterThan(0.05);
    expectPrinted('a-from-octaves', '+0.06');
  });

  test('float-threshold: minutes that lie exactly on a tonal threshold count', () => {
    const valid = marchMinutes.filter(({ isValid }) => isValid);
    const naive = valid.filter(({ thirdsTenths }) =>
      thirdsTenths.some((level, slot) => {
        const [below, above] = [thirdsTenths[slot - 1] ?? null, thirdsTenths[slot + 1] ?? null];
        const thresholdTenths = tonalThresholdTenths(slot - 19);
        if (level === null || below === null || above === null || thresholdTenths === null) return false;
        return (
          level / 10 - below / 10 >= thresholdTenths / 10 && level / 10 - above / 10 >= thresholdTenths / 10
        );
      }),
    );
    const tonal = valid.filter(({ thirdsTenths }) => surveyTones(thirdsTenths).length > 0);
    expect([naive.length, tonal.length]).toEqual([3122, 3123]);
    expectPrinted('float-threshold', '3122', '3123');
  });

  test('rounding: halves go up, once; toFixed and half-even do otherwise', () => {
    expect((1.005).toFixed(2)).toBe('1.00');
    expect(roundHalfUp(1.005, 2)).toBe(1.01);
    expect(roundHalfUp(64.45, 1)).toBe(64.5);
    expect(roundHalfUp(-0.05, 1)).toBe(0);
    expect(toTenths(0.05)).toBe(1);
    // Rounded twice, 64.449 would become 64.5.
    expect(roundHalfUp(64.449, 1)).toBe(64.4);
  });

  test('facade: taken off once, at a façade only', () => {
    expect(incidentLevel(60, 'facade')).toEqual({ levelDb: 57, correctionDb: -3 });
    expect(incidentLevel(60, 'free-field')).toEqual({ levelDb: 60, correctionDb: 0 });
    expect(incidentLevel(null, 'facade').levelDb).toBeNull();
  });
});
