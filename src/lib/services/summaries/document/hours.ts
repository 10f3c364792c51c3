import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type DocumentHour } from '#lib/contracts/monthFigures';
import { civilHours } from '../../figures/civilHours';
import { type MeasuredHour } from '../../figures/heatMap';
import { coverageOf } from '../../levels/figures';
import { type MonthEvidence } from './evidence';

/** Hours of the month and its last night that have begun, with their levels. */
export async function monthHours({ span, series, nowSec }: MonthEvidence): Promise<MeasuredHour[]> {
  const toSec = Math.min(Math.max(span.toSec, span.lastNightEndSec), nowSec);
  const hours: MeasuredHour[] = [];
  for (const hour of civilHours({ fromSec: span.fromSec, toSec }, span.timeZone)) {
    hours.push({ ...hour, levels: await series.levels(hour) });
  }
  return hours;
}

/** Hours of the calendar month as the document has them. */
export function documentHours(
  { span, nowSec, minimumCoverage }: MonthEvidence,
  hours: readonly MeasuredHour[],
): DocumentHour[] {
  return hours
    .filter(({ fromSec }) => fromSec < span.toSec)
    .map(({ date, hour, turn, fromSec, toSec, levels }) => {
      const covered = coverageOf(levels.sums, { fromSec, toSec }, minimumCoverage, nowSec);
      const { coverage, meetsMinimum } = covered;
      return { date, hour, turn, LAeq: levels.laeqDb(), coverage, meetsMinimum };
    });
}

/** Sums of the quarter-hours, with bands, that begin in each whole hour from an instant on. */
export function bandHours(
  { quarters }: Pick<MonthEvidence, 'quarters'>,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  columnSec: number,
): PeriodAccumulator[] {
  const columns = Array.from(
    { length: Math.ceil((toSec - fromSec) / columnSec) },
    () => new PeriodAccumulator(),
  );
  for (const { startSec, sums } of quarters) {
    if (startSec >= toSec) break;
    columns[Math.floor((startSec - fromSec) / columnSec)]?.merge({ sums });
  }
  return columns;
}
