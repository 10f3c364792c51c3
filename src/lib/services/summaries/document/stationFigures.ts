import { type PeriodKind, type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { type DayFigures } from '#lib/contracts/levels';
import { type DocumentDay, type DocumentFigures } from '#lib/contracts/monthFigures';
import { parseInstant } from '#lib/contracts/common';
import { datesBetween } from '#lib/time/zone';
import { type MeasuredHour } from '../../figures/heatMap';
import { type PeriodInstruments } from '../../figures/instruments';
import { datePeriods, settingsOfDate } from '../../levels/datePeriods';
import { type MonthFigures } from '../../levels/month';
import { type Span } from '../../levels/spans';
import { type MonthEvidence } from './evidence';
import { dayOf, levelsOf } from './monthLevels';
import { gapsOf, uncertaintiesOf, type CoveredLevel, type UncertaintyGround } from './uncertainties';

/** What a station’s month is told with beside its levels. */
export interface FiguresGround extends UncertaintyGround {
  hours: readonly MeasuredHour[];
  instruments: PeriodInstruments;
  /** LAeq of the incident sound of the month, dB. */
  incidentDb: number | null;
}

type PeriodLevels = Record<PeriodKind, CoveredLevel>;

/** Figures of the whole month with their uncertainties. */
export function documentFigures(
  evidence: MonthEvidence,
  month: MonthFigures,
  ground: FiguresGround,
): DocumentFigures {
  const { statistics, periods } = month;
  const { hours, instruments, incidentDb } = ground;
  const kinds: PeriodLevels = {
    day: { ...covered(periods.day), spans: spansOf(evidence, 'day') },
    evening: { ...covered(periods.evening), spans: spansOf(evidence, 'evening') },
    night: { ...covered(periods.night), spans: spansOf(evidence, 'night') },
  };
  const clock: CoveredLevel = {
    levelDb: statistics.LAeq,
    coverage: statistics.coverage,
    spans: [evidence.span],
  };
  const named = (percent: number) => statistics.LAN[String(percent)] ?? null;
  return {
    ...levelsOf(month),
    seconds: statistics.seconds,
    LCeq: statistics.LCeq,
    LAFmin: statistics.LAFmin,
    LCpeak: statistics.LCpeak,
    LA1: named(1),
    LA5: named(5),
    LA95: named(95),
    LA99: named(99),
    incident: incidentDb,
    U: uncertaintiesOf(schemeOf(evidence), { clock, kinds, ldenDb: month.ldenDb }, ground),
    uncertainty: {
      instrument: instruments.uncertaintyDb,
      basis: instruments.basisKind,
      drift: instruments.drift.driftDb,
      driftKnown: instruments.drift.known,
      gaps: gapsOf(hours, clock.spans, clock.coverage),
    },
  };
}

/** A date of the month with its uncertainties. */
export function documentDay(evidence: MonthEvidence, day: DayFigures, ground: FiguresGround): DocumentDay {
  const { LAeq24h, LAFmax, LA10, LA50, LA90, seconds, coverage, meetsMinimum, sampleSeconds, hours } = day;
  const own = ground.hours.filter(({ date }) => date === day.date);
  const civil = { fromSec: own[0]?.fromSec ?? 0, toSec: own.at(-1)?.toSec ?? 0 };
  const kindOf = (kind: PeriodKind, levelDb: number | null): CoveredLevel => {
    const period = day.periods[kind];
    const span = {
      fromSec: parseInstant(period?.from ?? '') ?? 0,
      toSec: parseInstant(period?.to ?? '') ?? 0,
    };
    return { levelDb, coverage: period?.coverage ?? 0, spans: [span] };
  };
  const kinds: PeriodLevels = {
    day: kindOf('day', day.Lday),
    evening: kindOf('evening', day.Levening),
    night: kindOf('night', day.Lnight),
  };
  const clock = { levelDb: LAeq24h, coverage, spans: [civil] };
  return {
    ...dayOf(day),
    LAeq24h,
    LAFmax,
    LA10,
    LA50,
    LA90,
    seconds,
    coverage,
    meetsMinimum,
    sampleSeconds,
    hours,
    U: uncertaintiesOf(schemeOf(evidence, day.date), { clock, kinds, ldenDb: day.Lden }, ground),
  };
}

function schemeOf({ timeline, span }: MonthEvidence, date: string = span.firstDate): PeriodScheme {
  return settingsOfDate(date, timeline).scheme;
}

function covered(period: MonthFigures['periods']['evening']): Omit<CoveredLevel, 'spans'> {
  return { levelDb: period?.laeqDb ?? null, coverage: period?.coverage ?? 0 };
}

function spansOf({ span, timeline }: MonthEvidence, wanted: PeriodKind): Span[] {
  return datesBetween(span.firstDate, span.endDate)
    .flatMap((date) => datePeriods(date, timeline))
    .filter(({ kind }) => kind === wanted);
}
