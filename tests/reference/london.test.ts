import { beforeAll, describe, expect, test } from 'vitest';
import { bandByNominalHz, bandsOf } from '#lib/acoustics/bands';
import { ldenDb, DEFAULT_SCHEME, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { toTenths } from '#lib/acoustics/rounding';
import { averagedNeighbourTones, surveyTones, thirdsTenthsOfDb } from '#lib/acoustics/tonality';
import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { addDays, localDateAt, localMinuteAt, startOfDaySec } from '#lib/time/zone';
import { periodAt, periodsOf } from '#lib/time/periods';
import { present, readJson } from './support/fixtures';
import { readLondonMinutes, type LondonMinute } from './support/london';

/** Sixty days of 1-minute thirds over a clock change, straight through the core: fixtures/london, made for these checks. */
const ZONE = 'Europe/London';

interface ByPercent {
  L1: number;
  L10: number;
  L50: number;
  L90: number;
  L95: number;
}
interface ExpectedPeriod {
  n: number;
  elapsed_min: number;
  coverage: number;
  LAeq: number | null;
}
interface ExpectedMonth extends ExpectedPeriod {
  LAFmax: number;
  LN: { inv: ByPercent };
  Lday: number;
  Levening: number;
  Lnight: number;
  Lnight_evening_dated: number;
  Lden_evening_dated: number;
  LN_period: Record<'day' | 'evening', ByPercent>;
  bands: Record<string, { Leq: number; L10_inv: number; L50_inv: number; L90_inv: number }>;
  octaves: Record<
    string,
    { Leq: number; L10_inv: number; L90_inv: number; wrong_L90_from_summing_third_L90: number }
  >;
  from_bands: { LAeq_analytic: number; LCeq_table: number; LZeq_20_20k: number; wrong_A_twice: number };
  tonal: {
    minutes_iso: number;
    by_band_iso: Record<string, number>;
    minutes_avg_variant: number;
    by_band_avg_variant: Record<string, number>;
    hourly_spectra: { hours_tested: number; tonal_hours_by_band: Record<string, number> };
  };
}
interface Expected {
  rows: number;
  valid_rows: number;
  elapsed_minutes: number;
  coverage: number;
  hourly: [string, string, number, number | null, number | null, number | null, number | null][];
  calendar_days: (ExpectedPeriod & {
    date: string;
    LAFmax: number;
    LN: { inv: ByPercent };
    tonal_minutes_iso: number;
    periods: Record<PeriodKind, ExpectedPeriod>;
  })[];
  nights: (ExpectedPeriod & {
    night_of: string;
    start_utc: string;
    end_utc: string;
    LA90_inv: number | null;
    LAFmax: number | null;
  })[];
  acoustic_days: { date: string; Lden: number | null }[];
  months: Record<'2026-03' | '2026-04', ExpectedMonth>;
  whole: { LAeq: number; LN: { inv: ByPercent }; tonal_minutes_iso: number };
  exceedances: Record<string, string[]>;
}

const expected = readJson<Expected>('london/expected_london.json');
const PERCENTS = [1, 10, 50, 90, 95] as const;

let minutes: LondonMinute[] = [];
const quarters = new Map<number, PeriodAccumulator>();
const months = new Map<string, PeriodAccumulator>();
const tonal = new Map<string, TonalCounts>();

interface TonalCounts {
  survey: number;
  averaged: number;
  surveyByBand: Record<string, number>;
  averagedByBand: Record<string, number>;
}

function accumulatorAt<Key>(
  map: Map<Key, PeriodAccumulator>,
  key: Key,
  bandClasses = false,
): PeriodAccumulator {
  const found = map.get(key) ?? new PeriodAccumulator({ bandClasses });
  map.set(key, found);
  return found;
}

function countTones(month: string, date: string, minute: LondonMinute): void {
  for (const key of [month, date]) {
    const counts = tonal.get(key) ?? { survey: 0, averaged: 0, surveyByBand: {}, averagedByBand: {} };
    tonal.set(key, counts);
    const survey = surveyTones(minute.thirdsTenths);
    const averaged = averagedNeighbourTones(minute.thirdsTenths);
    counts.survey += survey.length > 0 ? 1 : 0;
    counts.averaged += averaged.length > 0 ? 1 : 0;
    for (const { lowerIndex } of survey) countBand(counts.surveyByBand, lowerIndex);
    for (const { lowerIndex } of averaged) countBand(counts.averagedByBand, lowerIndex);
  }
}

function countBand(byBand: Record<string, number>, bandIndex: number): void {
  const name = String(present(bandsOf(3).find((band) => band.index === bandIndex)).nominalHz);
  byBand[name] = (byBand[name] ?? 0) + 1;
}

/** Figures of `from <= t < to`, merged from quarter-hours. */
function between(fromSec: number, toSec: number): PeriodAccumulator {
  const whole = new PeriodAccumulator();
  for (let at = fromSec; at < toSec; at += 900) {
    const quarter = quarters.get(at);
    if (quarter) whole.merge(quarter);
  }
  return whole;
}

function sec(utc: string): number {
  return Date.parse(utc) / 1000;
}

function utcMinute(epochSec: number): string {
  return `${new Date(epochSec * 1000).toISOString().slice(0, 16)}Z`;
}

function expectLevels(figures: PeriodAccumulator, levels: ByPercent): void {
  for (const percent of PERCENTS) {
    expect(figures.exceedanceLevelDb(percent), `L${percent}`).toBe(levels[`L${percent}`]);
  }
}

beforeAll(() => {
  minutes = readLondonMinutes();
  let hour = { startSec: NaN, date: '' };
  for (const minute of minutes) {
    const hourStartSec = minute.startSec - (minute.startSec % 3600);
    if (hourStartSec !== hour.startSec)
      hour = { startSec: hourStartSec, date: localDateAt(hourStartSec, ZONE) };
    const month = hour.date.slice(0, 7);
    accumulatorAt(quarters, minute.startSec - (minute.startSec % 900)).add(minute.interval, minute.isValid);
    accumulatorAt(months, month, true).add(minute.interval, minute.isValid);
    if (minute.isValid) countTones(month, hour.date, minute);
  }
});

describe('London, 60 days (fixtures/london/expected_london.json)', () => {
  test('rows, valid rows and coverage of the whole', () => {
    const whole = between(sec('2026-03-01T00:00Z'), sec('2026-04-29T23:00Z'));
    expect(minutes).toHaveLength(expected.rows);
    expect(whole.sums.validSec).toBe(expected.valid_rows * 60);
    expect(whole.sums.validSec / 60 / expected.elapsed_minutes).toBeCloseTo(expected.coverage, 5);
    expect(whole.sums.sampleSec).toBe(60);
    expect(whole.laeqDb()).toBeCloseTo(expected.whole.LAeq, 4);
    expectLevels(whole, expected.whole.LN.inv);
  });

  test('every hour: valid minutes, LAeq, LA10, LA90, LAFmax', () => {
    expect(expected.hourly.length).toBeGreaterThan(1400);
    for (const [startUtc, , validMinutes, laeq, la10, la90, lafmax] of expected.hourly) {
      const hour = between(sec(startUtc), sec(startUtc) + 3600);
      expect(hour.sums.validSec, startUtc).toBe(validMinutes * 60);
      expectNear(hour.laeqDb(), laeq, 1e-5, startUtc);
      expect(tenthsOf(hour, 10), startUtc).toBe(la10);
      expect(tenthsOf(hour, 90), startUtc).toBe(la90);
      expect(hour.sums.lafmaxCentiDb === null ? null : hour.sums.lafmaxCentiDb / 100, startUtc).toBe(lafmax);
      const hasEnough = validMinutes >= 30;
      expect(hour.exceedanceLevelDb(10), startUtc).toBe(hasEnough ? la10 : null);
      expect(hour.exceedanceLevelDb(1), `${startUtc}: 60 samples are too few for L1`).toBeNull();
    }
  });

  test('every calendar day: coverage, LAeq, LAFmax, L_N, tonal minutes; 1,380 minutes on the day of the change', () => {
    expect(expected.calendar_days).toHaveLength(60);
    for (const day of expected.calendar_days) {
      const fromSec = startOfDaySec(day.date, ZONE);
      const toSec = startOfDaySec(addDays(day.date, 1), ZONE);
      const figures = between(fromSec, toSec);
      expect((toSec - fromSec) / 60, day.date).toBe(day.elapsed_min);
      expect(figures.sums.validSec / 60, day.date).toBe(day.n);
      expect(figures.sums.validSec / (toSec - fromSec), day.date).toBeCloseTo(day.coverage, 5);
      expectNear(figures.laeqDb(), day.LAeq, 1e-5, day.date);
      expect(figures.sums.lafmaxCentiDb, day.date).toBe(
        day.LAFmax === null ? null : Math.round(day.LAFmax * 100),
      );
      for (const percent of PERCENTS) {
        const wanted = day.LN?.inv[`L${percent}`] ?? null;
        expect(tenthsOf(figures, percent), `${day.date} L${percent}`).toBe(wanted);
      }
      expect(tonal.get(day.date)?.survey ?? 0, day.date).toBe(day.tonal_minutes_iso);
    }
    expect(expected.calendar_days.find((day) => day.date === '2026-03-29')?.elapsed_min).toBe(1380);
  });

  test('every night, named by its evening: seven hours over the change', () => {
    for (const night of expected.nights) {
      const figures = between(sec(night.start_utc), sec(night.end_utc));
      const period = periodAt(sec(night.start_utc), DEFAULT_SCHEME, ZONE);
      expect([period.date, period.kind, period.toSec]).toEqual([night.night_of, 'night', sec(night.end_utc)]);
      expect(figures.sums.validSec / 60, night.night_of).toBe(night.n);
      expect(figures.sums.validSec / 60 / night.elapsed_min, night.night_of).toBeCloseTo(night.coverage, 5);
      expectNear(figures.laeqDb(), night.LAeq, 1e-5, night.night_of);
      expect(tenthsOf(figures, 90), night.night_of).toBe(night.LA90_inv);
    }
    expect(expected.nights.find((night) => night.night_of === '2026-03-28')?.elapsed_min).toBe(420);
  });

  test('Lden of every day with the night that begins on it; none where a period has no data', () => {
    const dates = expected.acoustic_days.map((day) => day.date);
    expect(dates).toHaveLength(60);
    for (const day of expected.acoustic_days) {
      const levels = { day: null, evening: null, night: null, ...levelsOfPeriods(day.date) };
      expectNear(ldenDb(DEFAULT_SCHEME, levels), day.Lden, 1e-5, day.date);
    }
    expect(expected.acoustic_days.filter((day) => day.Lden === null)).toHaveLength(3);
  });

  test.each(['2026-03', '2026-04'] as const)(
    'month %s: LAeq, L_N, pooled periods, Lden by the evening',
    (month) => {
      const wanted = expected.months[month];
      const figures = present(months.get(month));
      expect(figures.sums.validSec / 60).toBe(wanted.n);
      expect(figures.sums.validSec / 60 / wanted.elapsed_min).toBeCloseTo(wanted.coverage, 5);
      expectNear(figures.laeqDb(), wanted.LAeq, 1e-5);
      expect(figures.sums.lafmaxCentiDb).toBe(Math.round(wanted.LAFmax * 100));
      expectLevels(figures, wanted.LN.inv);
      const pooled = pooledPeriods(month);
      expectNear(pooled.day.laeqDb(), wanted.Lday, 1e-5);
      expectNear(pooled.evening.laeqDb(), wanted.Levening, 1e-5);
      expectNear(pooled.night.laeqDb(), wanted.Lnight_evening_dated, 1e-5);
      expectLevels(pooled.day, wanted.LN_period.day);
      expectLevels(pooled.evening, wanted.LN_period.evening);
      const lden = ldenDb(DEFAULT_SCHEME, {
        day: pooled.day.laeqDb(),
        evening: pooled.evening.laeqDb(),
        night: pooled.night.laeqDb(),
      });
      expectNear(lden, wanted.Lden_evening_dated, 1e-5);
      // A month's nights by the calendar are another quantity: they must not come out.
      expect(Math.abs(present(pooled.night.laeqDb()) - wanted.Lnight)).toBeGreaterThan(0.05);
    },
  );

  test.each(['2026-03', '2026-04'] as const)('month %s: every third and octave, Leq and L_N', (month) => {
    const wanted = expected.months[month];
    const figures = present(months.get(month));
    expect(Object.keys(wanted.bands)).toHaveLength(31);
    for (const [hz, band] of Object.entries(wanted.bands)) {
      const { index } = present(bandByNominalHz(3, Number(hz)), `band ${hz}`);
      expectNear(figures.bandLeqDb(index), band.Leq, 1e-4, hz);
      expect(figures.bandExceedanceLevelDb(index, 10), hz).toBe(band.L10_inv);
      expect(figures.bandExceedanceLevelDb(index, 50), hz).toBe(band.L50_inv);
      expect(figures.bandExceedanceLevelDb(index, 90), hz).toBe(band.L90_inv);
    }
    for (const [hz, octave] of Object.entries(wanted.octaves)) {
      const { index } = present(bandByNominalHz(1, Number(hz)), `octave ${hz}`);
      expectNear(figures.octaveLeqDb(index), octave.Leq, 1e-4, hz);
      // Expected from unrounded minute octaves; ours are of minutes rounded to tenths.
      expectNear(figures.octaveExceedanceLevelDb(index, 10), octave.L10_inv, 0.05 + 1e-9, hz);
      expectNear(figures.octaveExceedanceLevelDb(index, 90), octave.L90_inv, 0.05 + 1e-9, hz);
    }
    const wrong = present(wanted.octaves['125']).wrong_L90_from_summing_third_L90;
    expect(Math.abs(present(figures.octaveExceedanceLevelDb(-9, 90)) - wrong)).toBeGreaterThan(2);
    expect(figures.octaveLeqDb(-18), 'the 16 Hz octave lacks two thirds').toBeNull();
  });

  test.each(['2026-03', '2026-04'] as const)('month %s: levels from bands, weighted once', (month) => {
    const wanted = expected.months[month].from_bands;
    const bands = bandsOf(3).filter((band) => band.nominalHz >= 20);
    const figures = present(months.get(month));
    const levelsDb = bands.map((band) => figures.bandLeqDb(band.index));
    expectNear(levelFromBandsDb(levelsDb, bands, 'A'), wanted.LAeq_analytic, 1e-4);
    expectNear(levelFromBandsDb(levelsDb, bands, 'Z'), wanted.LZeq_20_20k, 1e-4);
    // The C value in the file is made with weights rounded to 0.1 dB.
    expectNear(levelFromBandsDb(levelsDb, bands, 'C'), wanted.LCeq_table, 0.05);
    expect(Math.abs(present(levelFromBandsDb(levelsDb, bands, 'A')) - wanted.wrong_A_twice)).toBeGreaterThan(
      0.9,
    );
  });

  test.each(['2026-03', '2026-04'] as const)('month %s: tonal minutes by both variants, by band', (month) => {
    const wanted = expected.months[month].tonal;
    const counts = present(tonal.get(month));
    expect(counts.survey).toBe(wanted.minutes_iso);
    expect(counts.surveyByBand).toEqual(wanted.by_band_iso);
    expect(counts.averaged).toBe(wanted.minutes_avg_variant);
    expect(counts.averagedByBand).toEqual(wanted.by_band_avg_variant);
  });

  test.each(['2026-03', '2026-04'] as const)('month %s: tonal hours of the hourly mean spectra', (month) => {
    const wanted = expected.months[month].tonal.hourly_spectra;
    const byBand: Record<string, number> = {};
    let tested = 0;
    for (const [startUtc] of expected.hourly) {
      if (localDateAt(sec(startUtc), ZONE).slice(0, 7) !== month) continue;
      const hour = between(sec(startUtc), sec(startUtc) + 3600);
      // The file tests the hours with at least 75 % coverage.
      if (hour.sums.validSec < 0.75 * 3600) continue;
      tested += 1;
      const levelsDb = bandsOf(3).map((band) => hour.bandLeqDb(band.index));
      for (const { lowerIndex } of surveyTones(thirdsTenthsOfDb(levelsDb, bandsOf(3))))
        countBand(byBand, lowerIndex);
    }
    expect(tested).toBe(wanted.hours_tested);
    expect(byBand).toEqual(wanted.tonal_hours_by_band);
  });

  test('exceedances: strictly greater, on tenths', () => {
    const hours = expected.hourly.filter(([startUtc]) => {
      const laeqDb = between(sec(startUtc), sec(startUtc) + 3600).laeqDb();
      return laeqDb !== null && toTenths(laeqDb) > 660;
    });
    expect(hours.map(([startUtc]) => startUtc)).toEqual(expected.exceedances['hour_LAeq_gt_66.0']);
    const loudQuarters = [...quarters].filter(([, q]) => toTenths(q.laeqDb() ?? -Infinity) > 720);
    expect(loudQuarters.map(([startSec]) => utcMinute(startSec))).toEqual(
      expected.exceedances['quarter_LAeq_gt_72.0'],
    );
  });

  test('exceedances by night and by Lden leave out periods below 75 % coverage', () => {
    const nights = expected.nights.filter((night) => {
      const figures = between(sec(night.start_utc), sec(night.end_utc));
      const coverage = figures.sums.validSec / 60 / night.elapsed_min;
      return coverage >= 0.75 && toTenths(figures.laeqDb() ?? -Infinity) > 560;
    });
    expect(nights.map((night) => night.night_of)).toEqual(expected.exceedances['night_LAeq_gt_56.0']);
    const days = expected.acoustic_days.filter(({ date }) => {
      const levels = { day: null, evening: null, night: null, ...levelsOfPeriods(date) };
      const isCovered = periodsOf(date, DEFAULT_SCHEME, ZONE).every(
        ({ fromSec, toSec }) => between(fromSec, toSec).sums.validSec >= 0.75 * (toSec - fromSec),
      );
      return isCovered && toTenths(ldenDb(DEFAULT_SCHEME, levels) ?? -Infinity) > 660;
    });
    expect(days.map((day) => day.date)).toEqual(expected.exceedances['day_Lden_gt_66.0']);
  });

  test('the clock of the wall at both sides of the change', () => {
    expect(localMinuteAt(sec('2026-03-29T00:59Z'), ZONE)).toBe(59);
    expect(localMinuteAt(sec('2026-03-29T01:00Z'), ZONE)).toBe(120);
  });
});

function levelsOfPeriods(date: string): Partial<Record<PeriodKind, number | null>> {
  return Object.fromEntries(
    periodsOf(date, DEFAULT_SCHEME, ZONE).map((p) => [p.kind, between(p.fromSec, p.toSec).laeqDb()]),
  );
}

function pooledPeriods(month: string): Record<PeriodKind, PeriodAccumulator> {
  const pooled = {
    day: new PeriodAccumulator(),
    evening: new PeriodAccumulator(),
    night: new PeriodAccumulator(),
  };
  for (let date = `${month}-01`; date.startsWith(month); date = addDays(date, 1)) {
    for (const period of periodsOf(date, DEFAULT_SCHEME, ZONE)) {
      pooled[period.kind].merge(between(period.fromSec, period.toSec));
    }
  }
  return pooled;
}

function tenthsOf(figures: PeriodAccumulator, percent: number): number | null {
  const tenths = figures.sums.aClasses.exceededTenths(percent);
  return tenths === null ? null : tenths / 10;
}

function expectNear(actual: number | null, wanted: number | null, tolerance: number, what = ''): void {
  if (actual === null || wanted === null) expect(actual, what).toBe(wanted);
  else expect(Math.abs(actual - wanted), `${what}: ${actual} for ${wanted}`).toBeLessThanOrEqual(tolerance);
}
