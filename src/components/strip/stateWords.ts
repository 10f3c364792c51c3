import { parseInstant } from '#lib/contracts/common';
import type { Station } from '#lib/contracts/stations';
import { formatAgo } from '#lib/format/durations';
import { clockWords, dayWords } from './model/timeWords';

/** "last post 40 s ago", "silent since Tue 17 Mar 03:15", "no post yet", "retired". */
export function stateWords(
  { state, latest }: Pick<Station, 'state' | 'latest'>,
  zone: string,
  nowSec: number,
): string {
  if (state === 'retired') return 'retired';
  if (latest === null) return 'no post yet';
  const endSec = (parseInstant(latest.start) ?? 0) + latest.seconds;
  if (state === 'silent') return `silent since ${dayWords(endSec, zone)} ${clockWords(endSec, zone)}`;
  return `last post ${formatAgo(parseInstant(latest.receivedAt) ?? endSec, nowSec)}`;
}
