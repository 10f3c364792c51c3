import type { Latest } from '#lib/contracts/stations';
import { formatDuration } from '#lib/format/durations';
import { formatLevelDb } from '#lib/format/levels';
import { formatInstantShort } from '#lib/format/times';
import { secondsOf } from './stateWords';

/** A station's newest interval in words: "17 Mar 12:00, LAeq 52.3 dB over 1 min". Times in `zone`. */
export function arrivalWords({ start, seconds, LAeq }: Latest, zone: string): string {
  const level = `LAeq ${formatLevelDb(LAeq)} dB over ${formatDuration(seconds)}`;
  return `${formatInstantShort(secondsOf(start), zone)}, ${level}`;
}
