import { type Connection } from '#db/queries/connection';
import { eachDayPeriod, type DayPeriod } from '#db/queries/dayPeriods';
import { type NetworkSettings } from '#db/queries/networks';
import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { datesBetween, type LocalDate } from '#lib/time/zone';
import { datePeriods } from '../../levels/datePeriods';
import { dirtySpans } from '../../levels/dirtySpans';
import { type LevelSource } from '../../levels/intervalSums';
import { QuarterSeries } from '../../levels/quarterSeries';
import { mergedSpans, overlapsAny, type Span } from '../../levels/spans';

/** A day, evening or night with its sums. */
export interface CurrentPeriod extends Span {
  /** Local date on which it begins. */
  date: LocalDate;
  kind: PeriodKind;
  sums: PeriodSums;
}

/** Days, evenings and nights that begin on some dates, in order of time and current: of those that have no right row, from quarter-hours. */
export async function currentPeriods(
  source: LevelSource & { timeline: NetworkSettings[] },
  { firstDate, endDate }: { firstDate: LocalDate; endDate: LocalDate },
  conn: Connection,
): Promise<CurrentPeriod[]> {
  const { station, timeline } = source;
  const wanted = datesBetween(firstDate, endDate).flatMap((date) =>
    datePeriods(date, timeline).map(({ kind, fromSec, toSec }) => ({ date, kind, fromSec, toSec })),
  );
  const whole: Span = { fromSec: wanted[0]?.fromSec ?? 0, toSec: wanted.at(-1)?.toSec ?? 0 };
  // Marks are read before rows: what is recomputed in between is then counted anew, never missed.
  const dirty = await dirtySpans(station.id, whole, conn);
  const rows = new Map<string, DayPeriod>();
  for await (const part of eachDayPeriod(station.id, whole, { bandClasses: false }, conn)) {
    for (const row of part) rows.set(keyOf(row), row);
  }
  const rowOf = (period: Omit<CurrentPeriod, 'sums'>) =>
    overlapsAny(dirty, period.fromSec, period.toSec) ? undefined : rows.get(keyOf(period));
  const found: CurrentPeriod[] = [];
  const missing: Omit<CurrentPeriod, 'sums'>[] = [];
  for (const period of wanted) {
    const row = rowOf(period);
    if (row) found.push({ ...period, sums: row.sums });
    else missing.push(period);
  }
  // What has no row is mostly time without data, months of it: read as one stretch.
  for (const span of mergedSpans(missing.map(({ fromSec, toSec }) => ({ fromSec, toSec })))) {
    const series = await QuarterSeries.read(source, span, conn);
    for (const period of missing) {
      const isWithin = span.fromSec <= period.fromSec && period.toSec <= span.toSec;
      if (isWithin) found.push({ ...period, sums: (await series.levels(period)).sums });
    }
  }
  return found.sort((a, b) => a.fromSec - b.fromSec);
}

const keyOf = ({ kind, fromSec, toSec }: Pick<DayPeriod, 'kind' | 'fromSec' | 'toSec'>) =>
  `${kind} ${fromSec} ${toSec}`;
