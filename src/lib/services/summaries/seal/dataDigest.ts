import { createHash } from 'node:crypto';
import { type Connection } from '#db/queries/connection';
import { digestIntervals } from '#db/queries/intervalDigests';
import { type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type DataDigest } from '#lib/contracts/summaryManifest';
import { type MonthSpan } from '../monthSpan';

/** The span of the intervals behind a month: calendar month, days that begin in it, and its last night. */
export function dataSpan(span: MonthSpan): { fromSec: number; toSec: number } {
  return {
    fromSec: Math.min(span.fromSec, span.firstDayStartSec),
    toSec: Math.max(span.toSec, span.lastNightEndSec),
  };
}

/** Digest of every interval behind a month, station by station; nothing but one part of one station stands in memory. */
export async function digestMonth(
  stations: readonly Pick<StationRow, 'id' | 'code'>[],
  span: MonthSpan,
  conn: Connection,
): Promise<DataDigest> {
  const { fromSec, toSec } = dataSpan(span);
  const found: DataDigest['stations'] = [];
  for (const { id, code } of [...stations].sort((a, b) => (a.code < b.code ? -1 : 1))) {
    const { intervals, sha256 } = await digestIntervals(id, fromSec, toSec, conn);
    found.push({ code, intervals, sha256 });
  }
  return {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    sha256: wholeDigest(found),
    stations: found,
  };
}

/** One digest of all stations’ digests. */
function wholeDigest(stations: DataDigest['stations']): string {
  const hash = createHash('sha256');
  for (const { code, intervals, sha256 } of stations) hash.update(`${code} ${intervals} ${sha256}\n`);
  return hash.digest('hex');
}
