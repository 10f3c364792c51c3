import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { percentileRank } from '#lib/acoustics/percentileRank';
import { roundHalfUp } from '#lib/acoustics/rounding';
import type { EvidenceContext, EvidenceExceedance } from '#lib/contracts/complaintEvidence';
import type { Statistics } from '#lib/contracts/levels';
import { windowConditions } from '../exceedances/conditions';
import type { PeriodFigures } from '../levels/figures';
import type { Usual } from '../levels/usual';
import { plantCandidates } from '../plants/candidates';
import { periodWind, periodWindWords, type SourcedWind } from '../weather/periodWind';
import type { LimitInForce } from './applyingLimits';
import { stationUncertainty } from './stationUncertainty';

const MOST_PLANTS = 5;

export interface ContextSource {
  station: StationRow;
  window: { fromSec: number; toSec: number };
  timeline: NetworkSettings[];
  nowSec: number;
  figures: PeriodFigures;
  statistics: Statistics;
  usual: Usual;
  inForce: readonly LimitInForce[];
  exceedances: readonly EvidenceExceedance[];
}

/** What more a station has to say about a window, rounded as it is shown. */
export async function evidenceContext(source: ContextSource): Promise<EvidenceContext> {
  const { station, window, timeline, nowSec, figures, statistics, usual } = source;
  const settings = pickSettings(timeline, window.fromSec);
  const { timeZone } = settings;
  const [uncertainty, plants, conditions, winds] = await Promise.all([
    stationUncertainty(station, figures, { timeline, timeZone, nowSec }),
    plantCandidates(station, window, nowSec),
    windowConditions(station, window, settings),
    periodWind(station.id, window),
  ]);
  const rank = statistics.LAeq === null ? null : percentileRank(statistics.LAeq, usual.levelsDb);
  const { lowFrequency } = statistics;
  return {
    rank: rank === null ? null : roundHalfUp(rank, 0),
    uncertainty: uncertainty.expandedDb === null ? null : roundHalfUp(uncertainty.expandedDb, 1),
    uncertaintyBasis: uncertainty.basis,
    limits: limitsOf(source),
    lowFrequency: lowFrequency && { ...lowFrequency, difference: roundHalfUp(lowFrequency.difference, 1) },
    standingOut: plants.standingOut,
    plants: plants.candidates.slice(0, MOST_PLANTS).map(({ name, reason }) => ({ name, reason })),
    bandFraction: figures.levels.sums.bandFraction ?? station.bandFraction,
    bands: statistics.bands.map(({ nominalHz, Leq }) => ({
      nominalHz,
      Leq: tenths(Leq),
      usual: tenths(usual.bands.find((band) => band.nominalHz === nominalHz)?.medianDb ?? null),
    })),
    exclusions: conditions.exclusions,
    flags: conditions.flags,
    wind: windOf(winds),
    windWords: periodWindWords(winds),
  };
}

function limitsOf({ inForce, exceedances }: ContextSource): EvidenceContext['limits'] {
  return inForce.map(({ limit, metric, threshold, unit, windows, windowCount }) => ({
    limit,
    metric,
    threshold,
    unit,
    windows,
    windowCount,
    isExceeded: exceedances.some(
      (one) => one.state === 'standing' && one.limit === limit && one.metric === metric,
    ),
  }));
}

function windOf(winds: readonly SourcedWind[]): EvidenceContext['wind'] {
  const told = winds.flatMap(({ wind }) => wind ?? []).sort((a, b) => b.seconds - a.seconds)[0];
  if (!told) return null;
  return {
    mean: roundHalfUp(told.meanSpeedMs, 1),
    maximum: roundHalfUp(told.maximumSpeedMs, 1),
    directionDeg: told.directionDeg === null ? null : roundHalfUp(told.directionDeg, 0),
  };
}

function tenths(levelDb: number | null): number | null {
  return levelDb === null ? null : roundHalfUp(levelDb, 1);
}
