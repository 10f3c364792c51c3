import { findGaps, findLastStart } from '#db/queries/intervalGaps';
import { formatInstantUtc } from '#lib/contracts/common';
import type { LastInterval } from '#lib/contracts/intervals';

const GAPS_OF_SEC = 7 * 86_400;
const MOST_GAPS = 200;

/** Where a monitor goes on: the last interval that its station has, and what is missing in the last seven days. */
export async function lastInterval(stationId: number, nowSec: number): Promise<LastInterval> {
  const [lastStartSec, gaps] = await Promise.all([
    findLastStart(stationId),
    findGaps(stationId, nowSec - GAPS_OF_SEC, MOST_GAPS),
  ]);
  return {
    lastStart: lastStartSec === null ? null : formatInstantUtc(lastStartSec),
    gaps: gaps.map(({ fromSec, toSec }) => ({
      from: formatInstantUtc(fromSec),
      to: formatInstantUtc(toSec),
    })),
  };
}
