import { type Connection } from '#db/queries/connection';
import { type Span } from '#db/queries/exclusions';
import { selectIntervals } from '#db/queries/intervals';
import { markQuarterHours } from '#db/queries/quarterHours';
import { quarterAt } from '#lib/time/quarters';

/**
 * Marks for recomputation what an exclusion touches: every quarter-hour that has a part of an interval that it overlaps,
 * because such an interval is left out whole. Quarter-hours that have not been computed yet are marked already. Call it with
 * the station locked, in the transaction that changes the exclusion.
 */
export async function markTouched(
  stationId: number,
  { fromSec, toSec }: Span,
  conn: Connection,
): Promise<void> {
  const [first] = await selectIntervals(stationId, fromSec, fromSec + 1, conn);
  const [last] = await selectIntervals(stationId, toSec - 1, toSec, conn);
  const startSec = Math.min(fromSec, first?.startSec ?? fromSec);
  const endSec = Math.max(toSec, last ? last.startSec + last.durationSec : toSec);
  await markQuarterHours(stationId, quarterAt(startSec), endSec, conn);
}
