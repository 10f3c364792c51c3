import { pool, type Connection } from '#db/queries/connection';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { type Seconds } from '#lib/contracts/levels';
import { keptFromSecOf, keptNote, onQuarters, requireKept } from '../retention/kept';
import { type Validity } from './accumulate';
import { currentSums } from './currentSums';
import { dirtySpans } from './dirtySpans';
import { type Span } from './spans';

export interface FiguresQuery extends Span {
  station: Pick<StationRow, 'id' | 'networkId' | 'intervalSec'>;
  /** `rules` (the default) leaves out what validity rules and exclusions say; `all` counts everything measured. */
  validity?: Validity;
  /** The network's settings in order of their beginning; read when left out. */
  timeline?: NetworkSettings[];
  /** Epoch seconds; a period counts as elapsed up to here. Now when left out. */
  nowSec?: number;
}

/** How much of a period has valid data. It travels with every figure of the period. */
export interface Coverage {
  seconds: Seconds;
  /** Valid seconds over the seconds of the period that have elapsed, 0–1; 0 where none have. */
  coverage: number;
  minimumCoverage: number;
  meetsMinimum: boolean;
}

/** What a period's figures are taken from, and its coverage. */
export interface PeriodFigures extends Coverage, Span {
  /** Levels, percentiles and bands in dB; distributions per band only where they were asked for. */
  levels: PeriodAccumulator;
  /** Said where the period reaches back to where single intervals are no longer kept; its ends are then whole quarter-hours. */
  keptNote: string | null;
}

/** Slack of the comparison with the minimum coverage, for products such as 0.7 × 3600. */
const SLACK_SEC = 1e-6;

/** Coverage of a period: valid seconds against those elapsed up to `nowSec`, under the settings in force at its start. */
export function coverageOf(
  { validSec, excludedSec }: Pick<PeriodSums, 'validSec' | 'excludedSec'>,
  { fromSec, toSec }: Span,
  minimumCoverage: number,
  nowSec: number,
): Coverage {
  const expectedSec = Math.max(0, Math.min(toSec, nowSec) - fromSec);
  return {
    seconds: { expected: expectedSec, valid: validSec, excluded: excludedSec },
    coverage: expectedSec === 0 ? 0 : Math.min(1, validSec / expectedSec),
    minimumCoverage,
    meetsMinimum: expectedSec > 0 && validSec >= minimumCoverage * expectedSec - SLACK_SEC,
  };
}

/**
 * Levels and coverage of a station's `fromSec <= t < toSec`, current: what still waits for recomputation is counted from its
 * intervals. `bandPercentiles: true` also counts the distribution of every band (a month costs about ten times as much).
 */
export async function periodFigures(
  query: FiguresQuery,
  { bandPercentiles = false }: { bandPercentiles?: boolean } = {},
  conn: Connection = pool(),
): Promise<PeriodFigures> {
  const { station, validity = 'rules' } = query;
  const keptFromSec = await keptFromSecOf(station.id, conn);
  const { fromSec, toSec } = onQuarters(query, keptFromSec);
  if (validity === 'all') requireKept(fromSec, keptFromSec);
  const nowSec = query.nowSec ?? Math.floor(Date.now() / 1000);
  const period = { fromSec, toSec };
  const [timeline, dirty] = await Promise.all([
    query.timeline ?? listSettings(station.networkId, conn),
    validity === 'rules' ? dirtySpans(station.id, period, conn) : [],
  ]);
  const options = { bandClasses: bandPercentiles, dirty };
  const levels = await currentSums({ station, timeline, validity }, period, options, conn);
  const { minimumCoverage } = pickSettings(timeline, fromSec);
  return {
    ...period,
    levels,
    keptNote: keptNote(fromSec, keptFromSec),
    ...coverageOf(levels.sums, period, minimumCoverage, nowSec),
  };
}
