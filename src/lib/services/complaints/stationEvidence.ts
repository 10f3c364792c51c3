import { listExceedancesOverlapping, type ExceedanceRecord } from '#db/queries/exceedanceRecords';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { countUnjudgedWindows } from '#db/queries/unjudgedWindows';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import type { EvidenceExceedance, StationEvidence, Usual } from '#lib/contracts/complaintEvidence';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { periodFigures } from '../levels/figures';
import { statisticsOf } from '../levels/statistics';
import { usualFor } from '../levels/usual';
import { applyingLimits } from './applyingLimits';
import { evidenceContext } from './evidenceContext';

const COVERAGE_DECIMALS = 4;

export interface StationEvidenceQuery {
  station: StationRow;
  window: { fromSec: number; toSec: number };
  timeline: NetworkSettings[];
  nowSec: number;
}

/** What one station has to say about a window. Levels are rounded here, once, half up, to 0.1 dB. */
export async function gatherStationEvidence(query: StationEvidenceQuery): Promise<StationEvidence> {
  const { station, window, timeline, nowSec } = query;
  const { fromSec, toSec } = window;
  const [figures, usual, records, limits, unjudged] = await Promise.all([
    periodFigures({ station, fromSec, toSec, timeline, nowSec }),
    usualFor({ station, window, timeline }),
    listExceedancesOverlapping(station.id, fromSec, toSec),
    applyingLimits(station, fromSec, toSec, timeline),
    countUnjudgedWindows(station.id, fromSec, toSec),
  ]);
  const statistics = statisticsOf(figures, { station });
  const exceedances = records.map(exceedanceOf);
  const { seconds, coverage, meetsMinimum, sampleSeconds, tonality } = statistics;
  const { inForce } = limits;
  return {
    station: station.code,
    name: station.name,
    sampleSeconds,
    LAeq: tenths(statistics.LAeq),
    LAFmax: tenths(statistics.LAFmax),
    LA10: tenths(statistics.LAN['10'] ?? null),
    LA90: tenths(statistics.LAN['90'] ?? null),
    seconds,
    coverage: roundHalfUp(coverage, COVERAGE_DECIMALS),
    meetsMinimum,
    usual: usualOf(usual),
    limits: { set: limits.set, applying: new Set(inForce.map(({ limitId }) => limitId)).size, unjudged },
    exceedances,
    tonality: tonality.state,
    tones: tonality.tones,
    context: await evidenceContext({ ...query, figures, statistics, usual, inForce, exceedances }),
  };
}

function usualOf({
  weeks,
  validWeeks,
  medianDb,
  lowDb,
  highDb,
}: Awaited<ReturnType<typeof usualFor>>): Usual {
  return { weeks, validWeeks, median: tenths(medianDb), low: tenths(lowDb), high: tenths(highDb) };
}

function exceedanceOf(record: ExceedanceRecord): EvidenceExceedance {
  return {
    id: record.id,
    limit: record.limitName,
    metric: limitMetricText(record),
    unit: limitUnit(record.metric),
    from: formatInstantUtc(record.startsAtSec),
    to: formatInstantUtc(record.endsAtSec),
    level: roundHalfUp(record.levelDb, 1),
    threshold: record.thresholdTenths / 10,
    state: record.state,
  };
}

function tenths(levelDb: number | null): number | null {
  return levelDb === null ? null : roundHalfUp(levelDb, 1);
}
