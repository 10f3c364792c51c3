import type { ExceedanceRecord } from '#db/queries/exceedanceRecords';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { DayFigures } from '#lib/contracts/levels';
import type {
  Coverage,
  MonthLevels,
  SummaryDay,
  SummaryExceedance,
  SummaryStation,
} from '#lib/contracts/summaries';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { madeBy } from '../calibrations/madeBy';
import { dayFigures } from '../levels/days';
import { placementsIn } from '../levels/incident';
import { monthFigures, type MonthFigures } from '../levels/month';
import { mastsOf } from '../weather/mastsOf';
import type { MonthSpan } from './monthSpan';

export interface StationMonthQuery {
  station: StationRow;
  span: MonthSpan;
  timeline: NetworkSettings[];
  /** Of this station in this month. */
  exceedances: ExceedanceRecord[];
  nowSec: number;
}

/** Everything that a month's summary says of one station. */
export async function stationSummary(query: StationMonthQuery): Promise<SummaryStation> {
  const { station, span, timeline, exceedances, nowSec } = query;
  const month = await monthFigures({ station, month: span.month, timeline, nowSec });
  const days = await dayFigures({
    station,
    fromDate: span.firstDate,
    toDate: span.endDate,
    timeline,
    nowSec,
  });
  const measured = { fromSec: span.fromSec, toSec: span.lastNightEndSec };
  return {
    code: station.code,
    name: station.name,
    latitude: station.latitude,
    longitude: station.longitude,
    placement: station.placement,
    mastHeightMetres: station.mastHeightM,
    bandFraction: station.bandFraction,
    intervalSeconds: station.intervalSec,
    placements: await placementsIn(station, measured),
    instruments: await madeBy(station, measured),
    masts: await mastsOf(station.id, measured),
    figures: levelsOf(month),
    bands: month.statistics.bands,
    days: days.filter((day) => day.periods.day.seconds.expected > 0).map(dayOf),
    exceedances: {
      standing: exceedances.filter(({ state }) => state === 'standing').length,
      lifted: exceedances.filter(({ state }) => state === 'lifted').length,
      items: exceedances.map(exceedanceOf),
    },
  };
}

/** The figures of a month’s summary. */
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

/** A date of a month’s summary. */
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

function exceedanceOf(record: ExceedanceRecord): SummaryExceedance {
  return {
    id: record.id,
    limit: record.limitName,
    metric: limitMetricText(record),
    from: formatInstantUtc(record.startsAtSec),
    to: formatInstantUtc(record.endsAtSec),
    level: record.levelDb,
    threshold: record.thresholdTenths / 10,
    unit: limitUnit(record.metric),
    coverage: record.coverage,
    state: record.state,
  };
}
