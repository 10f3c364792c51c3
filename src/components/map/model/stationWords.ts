import type { Station } from '#lib/contracts/stations';
import { formatAgo, formatDuration } from '#lib/format/durations';
import { descriptorText } from '#lib/format/descriptors';
import { formatLevelDb } from '#lib/format/levels';
import { secondsOf, stateWords } from '../../stations/stateWords';

/** What a station's mark says by its shape. */
export type MarkState = Station['state'] | 'over-limit';

/** A live station with a standing exceedance of the last hour is over its limit; a silent one is silent first. */
export function markStateOf({ state, overLimit }: Station): MarkState {
  return state === 'live' && overLimit ? 'over-limit' : state;
}

/** The averaging time of a station's current level: "1 min". */
export function averagingOf({ latest, intervalSeconds }: Station): string {
  return formatDuration(latest?.seconds ?? intervalSeconds);
}

/** A station and how it is doing, in a sentence: "Quay Head, MER-01: LAeq,1 min 64.2 dB, over a limit, 40 s ago." */
export function stationSentence(station: Station, zone: string, nowSec: number): string {
  const { latest } = station;
  const name = `${station.name}, ${station.code}`;
  if (station.state !== 'live' || !latest) return `${name}: ${stateWords(station, zone, nowSec)}.`;
  const level = `${descriptorText('LAeq', averagingOf(station))} ${formatLevelDb(latest.LAeq)} dB`;
  const limit = station.overLimit ? ', over a limit' : '';
  return `${name}: ${level}${limit}, ${formatAgo(secondsOf(latest.start) + latest.seconds, nowSec)}.`;
}
