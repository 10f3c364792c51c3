import { type LatestInterval } from '#db/queries/stationLatest';
import { type StationRow } from '#db/queries/stations';
import { type StationState } from '#lib/contracts/stations';

const LEAST_SILENCE_SEC = 900;
const INTERVALS_OF_SILENCE = 3;

/**
 * What a station is doing: `awaiting` before its first interval; `silent` once its newest interval ended longer ago than
 * a quarter-hour and three intervals; `retired` whatever it sends.
 */
export function stationState(
  station: Pick<StationRow, 'intervalSec' | 'retiredAt'>,
  latest: Pick<LatestInterval, 'startSec' | 'durationSec'> | undefined,
  nowSec: number,
): StationState {
  if (station.retiredAt) return 'retired';
  if (!latest) return 'awaiting';
  const allowedSec = Math.max(LEAST_SILENCE_SEC, INTERVALS_OF_SILENCE * station.intervalSec);
  return nowSec - (latest.startSec + latest.durationSec) > allowedSec ? 'silent' : 'live';
}
