import { type Connection } from '#db/queries/connection';
import { dirtyQuartersIn } from '#db/queries/dirtyMarks';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { mergedSpans, type Span } from './spans';

/** Quarter-hours of a period that wait for recomputation, as merged spans. */
export async function dirtySpans(stationId: number, period: Span, conn: Connection): Promise<Span[]> {
  const quarters = await dirtyQuartersIn(stationId, quarterAt(period.fromSec), period.toSec, conn);
  return mergedSpans([...quarters].map((fromSec) => ({ fromSec, toSec: fromSec + QUARTER_SEC })));
}
