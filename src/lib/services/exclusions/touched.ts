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
export async function markTouched(stationId: number, span: Span, conn: Connection): Promise<void> {
  const { fromSec, toSec } = await touchedSpan(stationId, span, conn);
  await markQuarterHours(stationId, quarterAt(fromSec), toSec, conn);
}

/** An exclusion's period with the whole of the intervals that straddle its ends. */
export async function touchedSpan(
  stationId: number,
  { fromSec, toSec }: Span,
  conn: Connection,
): Promise<Span> {
  const [first] = await selectIntervals(stationId, fromSec, fromSec + 1, conn);
  const [last] = await selectIntervals(stationId, toSec - 1, toSec, conn);
  return {
    fromSec: Math.min(fromSec, first?.startSec ?? fromSec),
    toSec: Math.max(toSec, last ? last.startSec + last.durationSec : toSec),
  };
}
