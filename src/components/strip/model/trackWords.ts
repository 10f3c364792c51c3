import { type Run } from './runs';
import { dayWords, yearOf } from './timeWords';
import { type Track } from './track';

/** "Ropewalk School (MER-01)". */
export function stationWords({ station }: Track): string {
  return `${station.name} (${station.code})`;
}

/** A strip's heading among two: its station, and its dates where they are not the axis's. */
export function stripTitle(track: Track, { fromSec, toSec }: Run, zone: string): string {
  if (track.shiftSec === 0) return stationWords(track);
  const [from, to] = [dayWords(fromSec, zone), dayWords(toSec - 1, zone)];
  const year = yearOf(toSec - 1, zone);
  return `${stationWords(track)}, ${from === to ? from : `${from} – ${to}`} ${year}`;
}
