import { type ClockEpisode } from '#db/queries/clockShifts';
import { pool, type Connection } from '#db/queries/connection';
import { listSettings, type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { LDN_SCHEME, ldenDb, ldnDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { formatInstantUtc } from '#lib/contracts/common';
import { type DayFigures, type PeriodCoverage } from '#lib/contracts/levels';
import { addDays, datesBetween, instantAtSec, type LocalDate } from '#lib/time/zone';
import { datePeriods, dateSettings, settingsOfDate } from './datePeriods';
import { coverageOf, type Coverage } from './figures';
import { QuarterSeries } from './quarterSeries';
import { type Span } from './spans';
import { levelOrNull } from './statistics';

export interface DaysQuery {
  station: Pick<StationRow, 'id' | 'networkId' | 'intervalSec'>;
  fromDate: LocalDate;
  /** Exclusive. */
  toDate: LocalDate;
  /** The network's settings in order of their beginning; read when left out. */
  timeline?: NetworkSettings[];
  /** Epoch seconds; a period counts as elapsed up to here. Now when left out. */
  nowSec?: number;
  /** Quarter-hours of every date asked for and its night; read when left out. */
  series?: QuarterSeries;
  /** Figures as if these were excluded, too. */
  alsoExcluded?: readonly Span[];
  /** Figures as if this episode of a wrong clock were moved. */
  moved?: ClockEpisode;
}

/** A day, evening or night with its level. */
export interface PeriodLevel extends Coverage, Span {
  kind: PeriodKind;
  levels: PeriodAccumulator;
}

/** Figures of each local date; the night is the one that begins on it, Ldn and the civil day's figures go by the calendar. */
export async function dayFigures(query: DaysQuery, conn: Connection = pool()): Promise<DayFigures[]> {
  const { station, fromDate, toDate, alsoExcluded, moved } = query;
  if (fromDate >= toDate) return [];
  const timeline = query.timeline ?? (await listSettings(station.networkId, conn));
  const nowSec = query.nowSec ?? Math.floor(Date.now() / 1000);
  const lastNight = datePeriods(addDays(toDate, -1), timeline).at(-1);
  const span = {
    fromSec: dateSettings(fromDate, timeline).midnightSec,
    toSec: Math.max(dateSettings(toDate, timeline).midnightSec, lastNight?.toSec ?? 0),
  };
  const source = { station, timeline, validity: 'rules', alsoExcluded, moved } as const;
  const series = query.series ?? (await QuarterSeries.read(source, span, conn));
  const days: DayFigures[] = [];
  for (const date of datesBetween(fromDate, toDate)) {
    days.push(await figuresOfDate(date, timeline, series, nowSec));
  }
  return days;
}

/** The periods that begin on a date with their levels. */
export async function periodLevelsOf(
  date: LocalDate,
  timeline: NetworkSettings[],
  series: QuarterSeries,
  nowSec: number,
): Promise<PeriodLevel[]> {
  const { minimumCoverage } = settingsOfDate(date, timeline);
  return Promise.all(
    datePeriods(date, timeline).map(async (period) => {
      const levels = await series.levels(period);
      return { ...period, levels, ...coverageOf(levels.sums, period, minimumCoverage, nowSec) };
    }),
  );
}

async function figuresOfDate(
  date: LocalDate,
  timeline: NetworkSettings[],
  series: QuarterSeries,
  nowSec: number,
): Promise<DayFigures> {
  const { settings, midnightSec } = dateSettings(date, timeline);
  const { scheme, timeZone, minimumCoverage } = settings;
  const civil = { fromSec: midnightSec, toSec: dateSettings(addDays(date, 1), timeline).midnightSec };
  const [periods, levels, Ldn] = await Promise.all([
    periodLevelsOf(date, timeline, series, nowSec),
    series.levels(civil),
    ldnOfDate(date, civil, timeZone, series),
  ]);
  const periodOf = (kind: PeriodKind) => periods.find((period) => period.kind === kind);
  const levelOf = (kind: PeriodKind) => periodOf(kind)?.levels.laeqDb() ?? null;
  const levelsDb = { day: levelOf('day'), evening: levelOf('evening'), night: levelOf('night') };
  const { seconds, coverage, meetsMinimum } = coverageOf(levels.sums, civil, minimumCoverage, nowSec);
  return {
    date,
    Lday: levelsDb.day,
    Levening: levelsDb.evening,
    Lnight: levelsDb.night,
    Lden: ldenDb(scheme, levelsDb),
    Ldn,
    LAeq24h: levels.laeqDb(),
    LAFmax: levelOrNull(levels.sums.lafmaxCentiDb),
    LA10: levels.exceedanceLevelDb(10),
    LA50: levels.exceedanceLevelDb(50),
    LA90: levels.exceedanceLevelDb(90),
    seconds,
    coverage,
    meetsMinimum,
    sampleSeconds: levels.sums.sampleSec,
    hours: (civil.toSec - civil.fromSec) / 3600,
    periods: {
      day: coverageOfPeriod(periodOf('day'), civil),
      evening: scheme.eveningStartMin === null ? null : coverageOfPeriod(periodOf('evening'), civil),
      night: coverageOfPeriod(periodOf('night'), civil),
    },
  };
}

/** Ldn of a civil date: 07–22, and both parts of the night within the date. */
async function ldnOfDate(
  date: LocalDate,
  civil: Span,
  timeZone: string,
  series: QuarterSeries,
): Promise<number | null> {
  const morningSec = instantAtSec(date, LDN_SCHEME.dayStartMin, timeZone);
  const nightSec = instantAtSec(date, LDN_SCHEME.nightStartMin, timeZone);
  const day = await series.levels({ fromSec: morningSec, toSec: nightSec });
  const night = await series.levels({ fromSec: civil.fromSec, toSec: morningSec });
  night.merge(await series.levels({ fromSec: nightSec, toSec: civil.toSec }));
  return ldnDb({ day: day.laeqDb(), night: night.laeqDb() });
}

function coverageOfPeriod(period: PeriodLevel | undefined, civil: Span): PeriodCoverage {
  if (!period) throw new Error(`A period of the date that begins at ${civil.fromSec} is missing.`);
  const { seconds, coverage, meetsMinimum } = period;
  return {
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    seconds,
    coverage,
    meetsMinimum,
  };
}
