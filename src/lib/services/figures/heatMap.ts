import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { formatInstantUtc } from '#lib/contracts/common';
import { type HourRow } from '#lib/contracts/figureSheet';
import { civilHours, skippedHours, type CivilHour } from './civilHours';
import { coveredOf, type SheetSource } from './source';

/** An hour of the clock with what was measured in it. */
export interface MeasuredHour extends CivilHour {
  levels: PeriodAccumulator;
}

/** Hours of the period that have begun, with their levels. */
export async function measuredHours(source: SheetSource): Promise<MeasuredHour[]> {
  const { period, nowSec, timeZone } = source;
  const elapsed = { fromSec: period.fromSec, toSec: Math.min(period.toSec, nowSec) };
  const hours: MeasuredHour[] = [];
  for (const hour of civilHours(elapsed, timeZone)) {
    hours.push({ ...hour, levels: await source.series.levels(hour) });
  }
  return hours;
}

/** Hourly LAeq by date and hour of the clock on the wall. */
export function heatMapOf(source: SheetSource, hours: readonly MeasuredHour[]): HourRow[] {
  const rows = new Map<string, HourRow>();
  for (const { date, hour, turn, fromSec, toSec, levels } of hours) {
    const row = rows.get(date) ?? {
      date,
      cells: [],
      skippedHours: skippedHours(date, source.timeZone),
    };
    rows.set(date, row);
    row.cells.push({
      date,
      hour,
      turn,
      from: formatInstantUtc(fromSec),
      to: formatInstantUtc(toSec),
      LAeq: levels.laeqDb(),
      ...coveredOf(source, { fromSec, toSec }, levels.sums.validSec),
    });
  }
  return [...rows.values()];
}
