import { pool, type Connection } from '#db/queries/connection';
import { listSettings, type NetworkSettings } from '#db/queries/networks';
import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type Statistics } from '#lib/contracts/levels';
import { addDays, datesBetween, type LocalDate } from '#lib/time/zone';
import { datePeriods, dateSettings, settingsOfDate } from './datePeriods';
import { periodLevelsOf, type PeriodLevel } from './days';
import { type LevelSource } from './intervalSums';
import { periodFigures } from './figures';
import { loudestOf, type Loudest } from './loudest';
import { poolPeriods, type PooledPeriods } from './pooledPeriods';
import { QuarterSeries } from './quarterSeries';
import { type Span } from './spans';
import { statisticsOf, type StatisticsQuery } from './statistics';

/** A station's month as asked for. */
export interface MonthQuery {
  station: StatisticsQuery['station'];
  /** Local month `YYYY-MM`. */
  month: string;
  /** The network's settings in order of their beginning; read when left out. */
  timeline?: NetworkSettings[];
  /** Epoch seconds; a period counts as elapsed up to here. Now when left out. */
  nowSec?: number;
  /** Quarter-hours of the month and its last night; read when left out. */
  series?: QuarterSeries;
}

export interface MonthFigures extends Span {
  month: string;
  timeZone: string;
  /** By the clock, from the month's first midnight to the next month's. */
  statistics: Statistics;
  /** What these are taken from, with distributions per band. */
  levels: PeriodAccumulator;
  /** Within the same clock month. */
  loudest: Loudest | null;
  /**
   * Pooled by the date on which a period begins, so the nights include the first hours of the next month. No evening where
   * the scheme has none.
   */
  periods: { day: PooledPeriods; evening: PooledPeriods | null; night: PooledPeriods };
  /** Of the pooled levels; null when one is missing, or when dates of the month follow different schemes. */
  ldenDb: number | null;
  isSchemeMixed: boolean;
}

/** Figures of a local month, for its summary. @throws RangeError unless `month` is `YYYY-MM`. */
export async function monthFigures(query: MonthQuery, conn: Connection = pool()): Promise<MonthFigures> {
  const { station, month } = query;
  const timeline = query.timeline ?? (await listSettings(station.networkId, conn));
  const nowSec = query.nowSec ?? Math.floor(Date.now() / 1000);
  const { firstDate, nextMonth } = datesOfMonth(month);
  const { settings, midnightSec } = dateSettings(firstDate, timeline);
  const { scheme, timeZone, minimumCoverage } = settings;
  const civil = { fromSec: midnightSec, toSec: dateSettings(nextMonth, timeline).midnightSec };
  const source: LevelSource = { station, timeline, validity: 'rules' };
  const lastNightEndSec = datePeriods(addDays(nextMonth, -1), timeline).at(-1)?.toSec ?? civil.toSec;
  const span = { fromSec: civil.fromSec, toSec: Math.max(civil.toSec, lastNightEndSec) };
  const series = query.series ?? (await QuarterSeries.read(source, span, conn));
  const periods: PeriodLevel[] = [];
  let isSchemeMixed = false;
  for (const date of datesBetween(firstDate, nextMonth)) {
    periods.push(...(await periodLevelsOf(date, timeline, series, nowSec)));
    isSchemeMixed ||= !isSameScheme(settingsOfDate(date, timeline).scheme, scheme);
  }
  const pooled = (kind: PeriodKind) =>
    poolPeriods(
      periods.filter((period) => period.kind === kind),
      minimumCoverage,
    );
  const [day, evening, night] = [pooled('day'), pooled('evening'), pooled('night')];
  const levelsDb = { day: day.laeqDb, evening: evening.laeqDb, night: night.laeqDb };
  const figures = await periodFigures(
    { station, ...civil, timeline, nowSec },
    { bandPercentiles: true },
    conn,
  );
  return {
    month,
    timeZone,
    ...civil,
    statistics: statisticsOf(figures, { station }),
    levels: figures.levels,
    loudest: await loudestOf(source, civil, series, conn),
    periods: { day, evening: periods.some(({ kind }) => kind === 'evening') ? evening : null, night },
    ldenDb: isSchemeMixed ? null : ldenDb(scheme, levelsDb),
    isSchemeMixed,
  };
}

function isSameScheme(a: NetworkSettings['scheme'], b: NetworkSettings['scheme']): boolean {
  return (
    a.dayStartMin === b.dayStartMin &&
    a.eveningStartMin === b.eveningStartMin &&
    a.nightStartMin === b.nightStartMin
  );
}

function datesOfMonth(month: string): { firstDate: LocalDate; nextMonth: LocalDate } {
  if (!/^\d{4}-(0[1-9]|1[0-2])$/.test(month))
    throw new RangeError(`${month} is not a month such as 2026-03.`);
  const firstDate = `${month}-01`;
  return { firstDate, nextMonth: `${addDays(firstDate, 31).slice(0, 7)}-01` };
}
