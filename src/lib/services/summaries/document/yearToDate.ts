import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { formatInstantUtc } from '#lib/contracts/common';
import { type YearToDate } from '#lib/contracts/monthFigures';
import { datesBetween, type LocalDate } from '#lib/time/zone';
import { instrumentsOf } from '../../figures/instruments';
import { currentSums } from '../../levels/currentSums';
import { datePeriods, dateSettings, settingsOfDate } from '../../levels/datePeriods';
import { coverageOf } from '../../levels/figures';
import { QuarterSeries } from '../../levels/quarterSeries';
import { levelOrNull } from '../../levels/statistics';
import { currentPeriods, type CurrentPeriod } from './currentPeriods';
import { earlierHours } from './earlierHours';
import { type MonthEvidence } from './evidence';
import { uncertaintiesOf, type CoveredLevel, type HourEnergy } from './uncertainties';

/** What the year so far rests on before the month. */
export interface EarlierGround {
  /** From the year’s first midnight on; only those with valid time. */
  hours: readonly HourEnergy[];
  /** What begins before the month; first the hours of the year before the first day begins, as the night that they are a part of. */
  periods: readonly CurrentPeriod[];
}

/**
 * Figures from the first of January to the end of the month: all energies pooled, never months averaged; their uncertainties as those of
 * the month. `hours` are the month’s own.
 */
export async function yearToDate(
  evidence: MonthEvidence,
  hours: readonly HourEnergy[],
): Promise<{ figures: YearToDate; earlier: EarlierGround }> {
  const { source, station, span, timeline, nowSec, minimumCoverage, conn } = evidence;
  const firstDate = `${span.month.slice(0, 4)}-01-01`;
  const civil = { fromSec: dateSettings(firstDate, timeline).midnightSec, toSec: span.toSec };
  const clock = await currentSums(source, civil, { bandClasses: false }, conn);
  const periods = await currentPeriods(source, { firstDate, endDate: span.endDate }, conn);
  const before = await earlierHours(source, { fromSec: civil.fromSec, toSec: span.fromSec }, conn);
  const kinds = {
    day: pooled(evidence, 'day', periods),
    evening: pooled(evidence, 'evening', periods),
    night: pooled(evidence, 'night', periods),
  };
  const levelsDb = { day: kinds.day.levelDb, evening: kinds.evening.levelDb, night: kinds.night.levelDb };
  const { seconds, coverage, meetsMinimum } = coverageOf(clock.sums, civil, minimumCoverage, nowSec);
  const { scheme } = settingsOfDate(firstDate, timeline);
  const lden = isOneScheme(evidence, firstDate) ? ldenDb(scheme, levelsDb) : null;
  const instruments = await instrumentsOf({ station, period: civil, timeZone: span.timeZone, conn });
  const whole: CoveredLevel = { levelDb: clock.laeqDb(), coverage, spans: [civil] };
  const figures = {
    from: formatInstantUtc(civil.fromSec),
    to: formatInstantUtc(civil.toSec),
    Lday: levelsDb.day,
    Levening: levelsDb.evening,
    Lnight: levelsDb.night,
    Lden: lden,
    LAeq: whole.levelDb,
    LA10: clock.exceedanceLevelDb(10),
    LA50: clock.exceedanceLevelDb(50),
    LA90: clock.exceedanceLevelDb(90),
    LAFmax: levelOrNull(clock.sums.lafmaxCentiDb),
    sampleSeconds: clock.sums.sampleSec,
    seconds,
    coverage,
    meetsMinimum,
    U: uncertaintiesOf(
      scheme,
      { clock: whole, kinds, ldenDb: lden },
      { hours: [...before, ...hours], instruments },
    ),
  };
  return { figures, earlier: await earlierGround(evidence, firstDate, periods, before) };
}

/** One kind of the year’s periods as a level, with its coverage of what has elapsed of them. */
function pooled(
  { nowSec }: MonthEvidence,
  kind: PeriodKind,
  periods: readonly CurrentPeriod[],
): CoveredLevel {
  const levels = new PeriodAccumulator();
  const spans = periods.filter((period) => period.kind === kind);
  let elapsedSec = 0;
  for (const { sums, fromSec, toSec } of spans) {
    levels.merge({ sums });
    elapsedSec += Math.max(0, Math.min(toSec, nowSec) - fromSec);
  }
  const coverage = elapsedSec === 0 ? 0 : Math.min(1, levels.sums.validSec / elapsedSec);
  return { levelDb: levels.laeqDb(), coverage, spans };
}

async function earlierGround(
  { source, span, timeline, conn }: MonthEvidence,
  firstDate: LocalDate,
  periods: readonly CurrentPeriod[],
  hours: readonly HourEnergy[],
): Promise<EarlierGround> {
  if (firstDate === span.firstDate) return { hours: [], periods: [] };
  const { midnightSec } = dateSettings(firstDate, timeline);
  const beginning = {
    fromSec: midnightSec,
    toSec: datePeriods(firstDate, timeline)[0]?.fromSec ?? midnightSec,
  };
  const series = await QuarterSeries.read(source, beginning, conn);
  const { sums } = await series.levels(beginning);
  const first: CurrentPeriod = { ...beginning, date: firstDate, kind: 'night', sums };
  return { hours, periods: [first, ...periods.filter(({ date }) => date < span.firstDate)] };
}

function isOneScheme({ span, timeline }: MonthEvidence, firstDate: LocalDate): boolean {
  const schemes = datesBetween(firstDate, span.endDate).map((date) => {
    const { scheme } = settingsOfDate(date, timeline);
    return `${scheme.dayStartMin} ${scheme.eveningStartMin} ${scheme.nightStartMin}`;
  });
  return new Set(schemes).size === 1;
}
