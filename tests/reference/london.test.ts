import { describe, expect, test } from 'vitest';
import { ldenDb, DEFAULT_SCHEME, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { toTenths } from '#lib/acoustics/rounding';
import { surveyTones } from '#lib/acoustics/tonality';
import { addDays, localMinuteAt, startOfDaySec } from '#lib/time/zone';
import { periodsOf } from '#lib/time/periods';
import { expectNear, present } from './support/fixtures';
import { LondonQuarters, MONTHS, minutesBetween, readLondonMinutes, sec, ZONE } from './support/london';
import { expected, PERCENTS, type ByPercent } from './support/londonExpected';

/** Sixty days of 1-minute thirds over a clock change, straight through the core. */
const minutes = readLondonMinutes();
const quarters = new LondonQuarters(minutes);
const between = (fromSec: number, toSec: number) => quarters.between(fromSec, toSec);

function utcMinute(epochSec: number): string {
  return `${new Date(epochSec * 1000).toISOString().slice(0, 16)}Z`;
}

function expectLevels(figures: PeriodAccumulator, levels: ByPercent): void {
  for (const percent of PERCENTS) {
    expect(figures.exceedanceLevelDb(percent), `L${percent}`).toBe(levels[`L${percent}`]);
  }
}

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
        const wanted = day.LN.inv[`L${percent}`];
        expect(tenthsOf(figures, percent), `${day.date} L${percent}`).toBe(wanted);
      }
      const tonal = minutesBetween(minutes, fromSec, toSec).filter(
        (minute) => minute.isValid && surveyTones(minute.thirdsTenths).length > 0,
      );
      expect(tonal, day.date).toHaveLength(day.tonal_minutes_iso);
    }
    expect(expected.calendar_days.find((day) => day.date === '2026-03-29')?.elapsed_min).toBe(1380);
  });

  test('every night, named by its evening: seven hours over the change', () => {
    for (const night of expected.nights) {
      const figures = between(sec(night.start_utc), sec(night.end_utc));
      const period = periodsOf(night.night_of, DEFAULT_SCHEME, ZONE).find(({ kind }) => kind === 'night');
      expect([period?.fromSec, period?.toSec]).toEqual([sec(night.start_utc), sec(night.end_utc)]);
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
      const figures = between(MONTHS[month].fromSec, MONTHS[month].toSec);
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

  test('exceedances: strictly greater, on tenths', () => {
    const hours = expected.hourly.filter(([startUtc]) => {
      const laeqDb = between(sec(startUtc), sec(startUtc) + 3600).laeqDb();
      return laeqDb !== null && toTenths(laeqDb) > 660;
    });
    expect(hours.map(([startUtc]) => startUtc)).toEqual(expected.exceedances['hour_LAeq_gt_66.0']);
    const loudQuarters = [...quarters.byStartSec].filter(([, q]) => toTenths(q.laeqDb() ?? -Infinity) > 720);
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
