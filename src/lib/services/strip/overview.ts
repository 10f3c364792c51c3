import { pool, type Connection } from '#db/queries/connection';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { type Statistics } from '#lib/contracts/levels';
import { coverageOf, type Coverage } from '#lib/services/levels/figures';
import {
  addEnergy,
  EnergySeries,
  laeqDbOf,
  noEnergy,
  type EnergySums,
} from '#lib/services/levels/energySeries';
import { type Span } from '#lib/services/levels/spans';
import { levelOrNull, periodStatistics, type StatisticsQuery } from '#lib/services/levels/statistics';
import { periodsBeginningIn, periodsConcerned, POOLED_FROM_SEC, type NamedPeriod } from './namedPeriods';
import { stepsOf } from './tableSteps';

export interface OverviewQuery extends Span {
  station: StatisticsQuery['station'];
  /** Epoch seconds; a period counts as elapsed up to here. */
  nowSec: number;
}

/** A day, evening or night, whole, with its level. */
export interface NamedLevel extends NamedPeriod, Coverage {
  laeqDb: number | null;
}

/** Many days, evenings or nights as one: their energies are pooled, never their levels averaged. */
export interface PooledLevel {
  /** Valid seconds against all that have elapsed. */
  coverage: number;
  meetsMinimum: boolean;
  laeqDb: number | null;
}

/** A row of the table that stands beside the picture. */
export interface TableRow extends Span, Coverage {
  laeqDb: number | null;
  lafmaxDb: number | null;
}

/** What a station's page says in figures about a period. */
export interface Overview {
  statistics: Statistics;
  /** Each day, evening and night concerned, in order of time; empty where `pooled` is given. */
  periods: NamedLevel[];
  /** Of a period of more than three days: its days, evenings and nights, each pooled; null where there are none. */
  pooled: { kind: PeriodKind; figures: PooledLevel }[] | null;
  /** Hour by hour, or day by day where that would be more than a week of hours. */
  rows: TableRow[];
  rowLength: 'hour' | 'day';
}

/** Figures of a station's period for its page, from stored quarter-hours where they are up to date. */
export async function stationOverview(query: OverviewQuery, conn: Connection = pool()): Promise<Overview> {
  const { station, nowSec } = query;
  const timeline = await listSettings(station.networkId, conn);
  const isPooled = query.toSec - query.fromSec >= POOLED_FROM_SEC;
  const named = isPooled ? periodsBeginningIn(query, timeline) : periodsConcerned(query, timeline);
  const source = { station, timeline, validity: 'rules' } as const;
  const [series, statistics] = await Promise.all([
    EnergySeries.read(source, spanOver([query, ...named]), conn),
    periodStatistics({ ...query, timeline }, conn),
  ]);
  const levels: SummedLevel[] = [];
  for (const period of named) levels.push(await levelOf(period, series, timeline, nowSec));
  const { rowLength, steps } = stepsOf(query, timeline, nowSec);
  const rows: TableRow[] = [];
  for (const step of steps) rows.push(rowOf(step, await series.sums(step), timeline, nowSec));
  return {
    statistics,
    periods: isPooled ? [] : levels,
    pooled: isPooled ? pooledKinds(levels, pickSettings(timeline, query.fromSec).minimumCoverage) : null,
    rows,
    rowLength,
  };
}

interface SummedLevel extends NamedLevel {
  sums: EnergySums;
}

async function levelOf(
  period: NamedPeriod,
  series: EnergySeries,
  timeline: NetworkSettings[],
  nowSec: number,
): Promise<SummedLevel> {
  const sums = await series.sums(period);
  const { minimumCoverage } = pickSettings(timeline, period.fromSec);
  const coverage = coverageOf(sums, period, minimumCoverage, nowSec);
  return { ...period, ...coverage, sums, laeqDb: laeqDbOf(sums) };
}

function rowOf(step: Span, sums: EnergySums, timeline: NetworkSettings[], nowSec: number): TableRow {
  return {
    ...step,
    ...coverageOf(sums, step, pickSettings(timeline, step.fromSec).minimumCoverage, nowSec),
    laeqDb: laeqDbOf(sums),
    lafmaxDb: levelOrNull(sums.lafmaxCentiDb),
  };
}

function pooledKinds(
  levels: readonly SummedLevel[],
  minimumCoverage: number,
): NonNullable<Overview['pooled']> {
  const kinds: readonly PeriodKind[] = ['day', 'evening', 'night'];
  return kinds.flatMap((kind) => {
    const held = levels.filter((period) => period.kind === kind);
    return held.length === 0 ? [] : [{ kind, figures: pooledLevel(held, minimumCoverage) }];
  });
}

function pooledLevel(periods: readonly SummedLevel[], minimumCoverage: number): PooledLevel {
  const sums = noEnergy();
  for (const period of periods) addEnergy(sums, period.sums);
  const expectedSec = periods.reduce((sum, { seconds }) => sum + seconds.expected, 0);
  const coverage = expectedSec === 0 ? 0 : Math.min(1, sums.validSec / expectedSec);
  return {
    coverage,
    meetsMinimum: expectedSec > 0 && coverage >= minimumCoverage,
    laeqDb: laeqDbOf(sums),
  };
}

function spanOver(spans: readonly Span[]): Span {
  return {
    fromSec: Math.min(...spans.map(({ fromSec }) => fromSec)),
    toSec: Math.max(...spans.map(({ toSec }) => toSec)),
  };
}
