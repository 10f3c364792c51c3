import { eachDayPeriod, type DayPeriod } from '#db/queries/dayPeriods';
import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { formatInstantUtc } from '#lib/contracts/common';
import { type YearToDate } from '#lib/contracts/monthFigures';
import { datesBetween, type LocalDate } from '#lib/time/zone';
import { currentSums } from '../../levels/currentSums';
import { datePeriods, dateSettings, settingsOfDate } from '../../levels/datePeriods';
import { dirtySpans } from '../../levels/dirtySpans';
import { coverageOf } from '../../levels/figures';
import { QuarterSeries } from '../../levels/quarterSeries';
import { mergedSpans, overlapsAny, type Span } from '../../levels/spans';
import { levelOrNull } from '../../levels/statistics';
import { type MonthEvidence } from './evidence';

interface KindSpan extends Span {
  kind: PeriodKind;
}

/** Figures from the first of January to the end of the month: all energies pooled, never months averaged. */
export async function yearToDate(evidence: MonthEvidence): Promise<YearToDate> {
  const { source, span, timeline, nowSec, minimumCoverage, conn } = evidence;
  const firstDate = `${span.month.slice(0, 4)}-01-01`;
  const civil = { fromSec: dateSettings(firstDate, timeline).midnightSec, toSec: span.toSec };
  const clock = await currentSums(source, civil, { bandClasses: false }, conn);
  const pooled = await pooledPeriods(evidence, firstDate);
  const levelOf = (kind: PeriodKind) => pooled.get(kind)?.laeqDb() ?? null;
  const levelsDb = { day: levelOf('day'), evening: levelOf('evening'), night: levelOf('night') };
  const { seconds, coverage, meetsMinimum } = coverageOf(clock.sums, civil, minimumCoverage, nowSec);
  return {
    from: formatInstantUtc(civil.fromSec),
    to: formatInstantUtc(civil.toSec),
    Lday: levelsDb.day,
    Levening: levelsDb.evening,
    Lnight: levelsDb.night,
    Lden: isOneScheme(evidence, firstDate)
      ? ldenDb(settingsOfDate(firstDate, timeline).scheme, levelsDb)
      : null,
    LAeq: clock.laeqDb(),
    LA10: clock.exceedanceLevelDb(10),
    LA50: clock.exceedanceLevelDb(50),
    LA90: clock.exceedanceLevelDb(90),
    LAFmax: levelOrNull(clock.sums.lafmaxCentiDb),
    sampleSeconds: clock.sums.sampleSec,
    seconds,
    coverage,
    meetsMinimum,
  };
}

async function pooledPeriods(
  { source, station, span, timeline, conn }: MonthEvidence,
  firstDate: LocalDate,
): Promise<Map<PeriodKind, PeriodAccumulator>> {
  const wanted = datesBetween(firstDate, span.endDate).flatMap((date) => datePeriods(date, timeline));
  const whole: Span = { fromSec: wanted[0]?.fromSec ?? 0, toSec: wanted.at(-1)?.toSec ?? 0 };
  // Marks are read before rows: what is recomputed in between is then counted anew, never missed.
  const dirty = await dirtySpans(station.id, whole, conn);
  const rows = new Map<string, DayPeriod>();
  for await (const part of eachDayPeriod(station.id, whole, { bandClasses: false }, conn)) {
    for (const row of part) rows.set(`${row.kind} ${row.fromSec} ${row.toSec}`, row);
  }
  const isStored = ({ kind, fromSec, toSec }: KindSpan) =>
    rows.has(`${kind} ${fromSec} ${toSec}`) && !overlapsAny(dirty, fromSec, toSec);
  const stored = wanted.filter(isStored);
  const pooled = new Map<PeriodKind, PeriodAccumulator>();
  const into = (kind: PeriodKind) => {
    const levels = pooled.get(kind) ?? new PeriodAccumulator();
    pooled.set(kind, levels);
    return levels;
  };
  for (const { kind, fromSec, toSec } of stored) {
    const row = rows.get(`${kind} ${fromSec} ${toSec}`);
    if (row) into(kind).merge(row);
  }
  // What has no row is mostly time without data, months of it: read as one stretch.
  const missing = wanted.filter((period) => !isStored(period));
  for (const span of mergedSpans(missing.map(({ fromSec, toSec }) => ({ fromSec, toSec })))) {
    const series = await QuarterSeries.read(source, span, conn);
    for (const { kind, fromSec, toSec } of missing) {
      if (span.fromSec <= fromSec && toSec <= span.toSec) {
        into(kind).merge(await series.levels({ fromSec, toSec }));
      }
    }
  }
  return pooled;
}

function isOneScheme({ span, timeline }: MonthEvidence, firstDate: LocalDate): boolean {
  const schemes = datesBetween(firstDate, span.endDate).map((date) => {
    const { scheme } = settingsOfDate(date, timeline);
    return `${scheme.dayStartMin} ${scheme.eveningStartMin} ${scheme.nightStartMin}`;
  });
  return new Set(schemes).size === 1;
}
