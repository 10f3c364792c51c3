import { listLimitVersions, type LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { EvidenceContext } from '#lib/contracts/complaintEvidence';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { LONGEST_WINDOW_SEC } from '../limits/force';
import { windowsOf, type LimitWindow } from '../limits/windows';

/** Windows of a limit that are told one by one. */
const MOST_WINDOWS = 4;

export type LimitInForce = Omit<EvidenceContext['limits'][number], 'isExceeded'> & { limitId: number };

export interface ApplyingLimits {
  /** How many limits are set for the station at that time, whatever their days and hours. */
  set: number;
  /** The version of each limit that has a window which overlaps, by the same windows and holidays as the judge. */
  inForce: LimitInForce[];
}

/** Limits at a station in `fromSec <= t < toSec`. */
export async function applyingLimits(
  station: StationRow,
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): Promise<ApplyingLimits> {
  const versions = await listLimitVersions(station.networkId);
  const here = versions.filter(({ stationIds }) => stationIds === null || stationIds.includes(station.id));
  const isSet = ({ effectiveFromSec, withdrawnAt }: LimitVersion) =>
    effectiveFromSec < toSec && (withdrawnAt === null || withdrawnAt.getTime() > fromSec * 1000);
  const inForce = here.flatMap((version) => {
    const next = here.find(
      (other) => other.limitId === version.limitId && other.version === version.version + 1,
    );
    const windows = windowsOf(version, fromSec - LONGEST_WINDOW_SEC, toSec, timeline).filter(
      ({ startSec, endSec }) => endSec > fromSec && startSec < (next?.effectiveFromSec ?? Infinity),
    );
    return windows.length === 0 ? [] : [limitInForce(version, windows)];
  });
  return { set: new Set(here.filter(isSet).map(({ limitId }) => limitId)).size, inForce };
}

function limitInForce(version: LimitVersion, windows: readonly LimitWindow[]): LimitInForce {
  return {
    limitId: version.limitId,
    limit: version.name,
    metric: limitMetricText(version),
    threshold: version.thresholdTenths / 10,
    unit: limitUnit(version.metric),
    windows: windows.slice(0, MOST_WINDOWS).map(({ startSec, endSec }) => ({
      from: formatInstantUtc(startSec),
      to: formatInstantUtc(endSec),
    })),
    windowCount: windows.length,
  };
}
