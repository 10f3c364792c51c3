import { pool } from '#db/queries/connection';
import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { meanSpeedMs } from '#lib/acoustics/windRule';
import type { LimitWind } from '#lib/contracts/exceedanceDetail';
import type { Span } from '../levels/spans';
import { WindowLevels } from '../limits/windowLevels';

/** How the wind of a window was to the limit that judges it, from the data as they are now; null where the limit heeds none of its own. */
export async function limitWindOf(
  { windRule: wind }: Pick<LimitVersion, 'windRule'>,
  station: StationRow,
  window: Span,
  timeline: NetworkSettings[],
): Promise<LimitWind | null> {
  if (!wind) return null;
  const levels = new WindowLevels({ station, timeline, validity: 'rules', wind }, pool());
  const found = await levels.windOf(window);
  return {
    meanSpeed: meanSpeedMs(found),
    secondsMeasured: found.measuredSec,
    secondsKnown: found.knownSec,
    secondsWithin: found.withinSec,
    secondsOutside: found.outsideSec,
    secondsUnknown: found.unknownSec,
  };
}
