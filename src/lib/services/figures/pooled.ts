import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type PooledRow } from '#lib/contracts/figureSheet';
import { weekdayOf } from '#lib/time/zone';
import { levelOrNull } from '../levels/statistics';
import { type MeasuredHour } from './heatMap';

/** A stretch of time with its levels and how much of it has elapsed. */
export interface Part {
  levels: PeriodAccumulator;
  expectedSec: number;
}

const WEEKDAYS = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday'] as const;

/** Parts pooled as one: energies and distributions are added, never levels averaged. */
export function poolParts(label: string, parts: readonly Part[], minimumCoverage: number): PooledRow {
  const levels = new PeriodAccumulator();
  for (const part of parts) levels.merge(part.levels);
  const expected = parts.reduce((sum, { expectedSec }) => sum + expectedSec, 0);
  const { validSec, excludedSec, lafmaxCentiDb } = levels.sums;
  const coverage = expected === 0 ? 0 : Math.min(1, validSec / expected);
  return {
    label,
    LAeq: levels.laeqDb(),
    LA10: levels.exceedanceLevelDb(10),
    LA50: levels.exceedanceLevelDb(50),
    LA90: levels.exceedanceLevelDb(90),
    LAFmax: levelOrNull(lafmaxCentiDb),
    seconds: { expected, valid: validSec, excluded: excludedSec },
    coverage,
    meetsMinimum: expected > 0 && coverage >= minimumCoverage,
  };
}

/** Levels of each hour of the clock, all dates together; both hours of an autumn change belong to theirs. */
export function byHourOfDay(hours: readonly MeasuredHour[], minimumCoverage: number): PooledRow[] {
  return Array.from({ length: 24 }, (_, hour) => {
    const label = `${pad(hour)}–${pad(hour + 1)}`;
    return poolParts(label, partsOf(hours.filter((one) => one.hour === hour)), minimumCoverage);
  });
}

/** Levels of each weekday, Monday first, by the civil date of each hour. */
export function byWeekday(hours: readonly MeasuredHour[], minimumCoverage: number): PooledRow[] {
  const weekdays = new Map(hours.map(({ date }) => [date, weekdayOf(date)]));
  return WEEKDAYS.map((label, weekday) =>
    poolParts(label, partsOf(hours.filter(({ date }) => weekdays.get(date) === weekday)), minimumCoverage),
  );
}

function partsOf(hours: readonly MeasuredHour[]): Part[] {
  return hours.map(({ levels, fromSec, toSec }) => ({ levels, expectedSec: toSec - fromSec }));
}

const pad = (hour: number) => String(hour).padStart(2, '0');
