import { type Connection } from '#db/queries/connection';
import { selectQuarterHours } from '#db/queries/quarterHours';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { type Span } from './spans';

/** Sums of every stored quarter-hour that a period touches, wholly: where single intervals are no longer kept, that is all there is. */
export async function sumSealedQuarters(
  stationId: number,
  { fromSec, toSec }: Span,
  conn: Connection,
): Promise<PeriodAccumulator> {
  const whole = new PeriodAccumulator();
  const endSec = quarterAt(toSec + QUARTER_SEC - 1);
  const quarters = await selectQuarterHours(stationId, quarterAt(fromSec), endSec, { bands: true }, conn);
  for (const quarter of quarters) whole.merge(quarter);
  return whole;
}
