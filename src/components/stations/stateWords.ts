import type { Station } from '#lib/contracts/stations';
import { formatClock, formatDate, formatInstantShort } from '#lib/format/times';
import { localDateAt } from '#lib/time/zone';

/** What a station is doing, in words: "live", "silent since 03:15", "no post yet", "retired Tue 17 March 2026". */
export function stateWords(station: Station, zone: string, nowSec: number): string {
  const { state, latest, retiredAt } = station;
  if (state === 'retired') return `retired ${formatDate(secondsOf(retiredAt ?? ''), zone)}`;
  if (state === 'awaiting' || latest === null) return 'no post yet';
  if (state === 'live') return 'live';
  const endedSec = secondsOf(latest.start) + latest.seconds;
  const sinceSec = endedSec - (endedSec % 60);
  const isToday = localDateAt(sinceSec, zone) === localDateAt(nowSec, zone);
  return `silent since ${isToday ? formatClock(sinceSec, zone) : formatInstantShort(sinceSec, zone)}`;
}

/** Epoch seconds of an instant of the interface. */
export function secondsOf(instant: string): number {
  return Math.floor(Date.parse(instant) / 1000);
}
