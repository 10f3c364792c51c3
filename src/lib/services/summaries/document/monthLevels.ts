import { formatInstantUtc } from '#lib/contracts/common';
import { type DayFigures } from '#lib/contracts/levels';
import { type Coverage, type MonthLevels, type SummaryDay } from '#lib/contracts/summaries';
import { type MonthFigures } from '../../levels/month';

/** The figures of a month. */
export function levelsOf({ statistics, periods, loudest, ldenDb }: MonthFigures): MonthLevels {
  const { day, evening, night } = periods;
  return {
    Lday: day.laeqDb,
    Levening: evening?.laeqDb ?? null,
    Lnight: night.laeqDb,
    Lden: ldenDb,
    LAeq: statistics.LAeq,
    LA10: statistics.LAN['10'] ?? null,
    LA50: statistics.LAN['50'] ?? null,
    LA90: statistics.LAN['90'] ?? null,
    LAFmax: statistics.LAFmax,
    LAFmaxAt: loudest && formatInstantUtc(loudest.startSec),
    sampleSeconds: statistics.sampleSeconds,
    ...coverageOf(statistics),
    periods: periodCoverages(day, evening, night),
  };
}

/** A date of a month. */
export function dayOf(day: DayFigures): SummaryDay {
  const { date, Lday, Levening, Lnight, Lden, periods } = day;
  return {
    date,
    Lday,
    Levening,
    Lnight,
    Lden,
    periods: periodCoverages(periods.day, periods.evening, periods.night),
  };
}

interface CoveredPeriod extends Coverage {
  seconds: { expected: number; valid: number };
}

function periodCoverages(day: CoveredPeriod, evening: CoveredPeriod | null, night: CoveredPeriod) {
  const periods = [day, night, ...(evening ? [evening] : [])];
  const expected = periods.reduce((sum, { seconds }) => sum + seconds.expected, 0);
  const valid = periods.reduce((sum, { seconds }) => sum + seconds.valid, 0);
  return {
    day: coverageOf(day),
    evening: evening && coverageOf(evening),
    night: coverageOf(night),
    whole: {
      coverage: expected === 0 ? 0 : Math.min(1, valid / expected),
      meetsMinimum: periods.every(({ meetsMinimum }) => meetsMinimum),
    },
  };
}

function coverageOf({ coverage, meetsMinimum }: Coverage): Coverage {
  return { coverage, meetsMinimum };
}
