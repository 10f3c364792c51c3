import { listLimitVersions, type LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { LONGEST_WINDOW_SEC } from '../limits/force';
import { windowsOf } from '../limits/windows';

/** How many limits are set for a station, and how many of them have a window that overlaps `fromSec <= t < toSec`. */
export async function applyingLimits(
  station: StationRow,
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): Promise<{ set: number; applying: number }> {
  const versions = await listLimitVersions(station.networkId);
  const here = versions.filter(({ stationIds }) => stationIds === null || stationIds.includes(station.id));
  const isSet = ({ effectiveFromSec, withdrawnAt }: LimitVersion) =>
    effectiveFromSec < toSec && (withdrawnAt === null || withdrawnAt.getTime() > fromSec * 1000);
  const applying = here.filter((version) => {
    const next = here.find(
      (other) => other.limitId === version.limitId && other.version === version.version + 1,
    );
    return windowsOf(version, fromSec - LONGEST_WINDOW_SEC, toSec, timeline).some(
      ({ startSec, endSec }) => endSec > fromSec && startSec < (next?.effectiveFromSec ?? Infinity),
    );
  });
  return { set: limitCount(here.filter(isSet)), applying: limitCount(applying) };
}

function limitCount(versions: readonly LimitVersion[]): number {
  return new Set(versions.map(({ limitId }) => limitId)).size;
}
