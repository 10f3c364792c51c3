import { listCounted, type CountedComplaint } from '#db/queries/complaintCounts';
import { selectExceededSpans, type ExceededSpan } from '#db/queries/mapLayers';
import { pool } from '#db/queries/connection';
import { listSettings, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { addDays, datesBetween, type LocalDate } from '#lib/time/zone';
import { datePeriods, dateSettings, settingsOfDate } from '../levels/datePeriods';
import { EnergySeries, laeqDbOf } from '../levels/energySeries';
import { coverageOf } from '../levels/figures';
import type { Span } from '../levels/spans';
import { isRepeat } from './counts';

/** The night that begins on a date, at one station. */
export interface NightLevel {
  station: string;
  levelDb: number;
  coverage: number;
}

/** A date with the night that begins on it. */
export interface CalendarDate extends Span {
  date: LocalDate;
  /** Complaints whose noise began in it, repeats left out. */
  complaints: number;
  /** Of these, those that began in its night. */
  atNight: number;
  /** Limits that were passed for a while within it. */
  exceedances: number;
  /** The loudest night of the stations asked for, of those with enough data; null where none has. */
  night: NightLevel | null;
}

interface CalendarQuery {
  network: NetworkRow;
  /** Civil dates, `toDate` exclusive. */
  fromDate: LocalDate;
  toDate: LocalDate;
  /** Code of a station: only its levels, exceedances and complaints. Null: all. */
  station: string | null;
  nowSec: number;
}

/**
 * Complaints over levels, date by date. A date goes from the beginning of its day to the end of the night that begins on it, as levels
 * of dates do everywhere: a noise at 03:40 is of the date before.
 */
export async function complaintCalendar(query: CalendarQuery): Promise<CalendarDate[]> {
  const { network, fromDate, toDate, nowSec } = query;
  const timeline = await listSettings(network.id);
  const dates = datesBetween(fromDate, toDate).map((date) => ({ date, ...spanOf(date, timeline) }));
  const [first, last] = [dates[0], dates.at(-1)];
  if (!first || !last) return [];
  const whole = { fromSec: first.fromSec, toSec: last.toSec };
  const stations = (await listStations(network.id)).filter(
    ({ code }) => query.station === null || code === query.station,
  );
  const ids = new Set(stations.map(({ id }) => id));
  const [rows, exceeded, nights] = await Promise.all([
    listCounted(network.id, whole),
    selectExceededSpans(network.id, whole.fromSec, whole.toSec),
    nightsOf(stations, dates, timeline, nowSec),
  ]);
  const counted = rows.filter(
    (row) => !isRepeat(row) && (query.station === null || row.stationCode === query.station),
  );
  return dates.map(({ date, nightSec, ...span }) => ({
    date,
    ...span,
    complaints: beginningIn(counted, span).length,
    atNight: beginningIn(counted, { fromSec: nightSec, toSec: span.toSec }).length,
    exceedances: exceeded.filter((one) => ids.has(one.stationId) && touches(one, span)).length,
    night: nights.get(date) ?? null,
  }));
}

function spanOf(date: LocalDate, timeline: NetworkSettings[]): Span & { nightSec: number } {
  const periods = datePeriods(date, timeline);
  const night = periods.find(({ kind }) => kind === 'night');
  const fromSec = Math.min(...periods.map((period) => period.fromSec));
  const toSec = Math.max(...periods.map((period) => period.toSec));
  return { fromSec, toSec, nightSec: night?.fromSec ?? toSec };
}

function beginningIn(rows: readonly CountedComplaint[], { fromSec, toSec }: Span): CountedComplaint[] {
  return rows.filter(({ startsAtSec }) => startsAtSec >= fromSec && startsAtSec < toSec);
}

function touches(one: ExceededSpan, span: Span): boolean {
  return one.fromSec < span.toSec && one.toSec > span.fromSec;
}

/** By date, the loudest of the stations' nights that have enough data. */
async function nightsOf(
  stations: readonly StationRow[],
  dates: readonly { date: LocalDate }[],
  timeline: NetworkSettings[],
  nowSec: number,
): Promise<Map<LocalDate, NightLevel>> {
  const [first, last] = [dates[0]?.date ?? '', dates.at(-1)?.date ?? ''];
  const span = {
    fromSec: dateSettings(first, timeline).midnightSec,
    toSec: dateSettings(addDays(last, 2), timeline).midnightSec,
  };
  const loudest = new Map<LocalDate, NightLevel>();
  // One station after another: a month of each is read at once.
  for (const station of stations) {
    const series = await EnergySeries.read({ station, timeline, validity: 'rules' }, span, pool());
    for (const { date } of dates) {
      const night = datePeriods(date, timeline).find(({ kind }) => kind === 'night');
      if (!night || night.fromSec >= nowSec) continue;
      const sums = await series.sums(night);
      const { minimumCoverage } = settingsOfDate(date, timeline);
      const { coverage, meetsMinimum } = coverageOf(sums, night, minimumCoverage, nowSec);
      const levelDb = laeqDbOf(sums);
      if (!meetsMinimum || levelDb === null || levelDb <= (loudest.get(date)?.levelDb ?? -Infinity)) continue;
      loudest.set(date, { station: station.code, levelDb, coverage });
    }
  }
  return loudest;
}
