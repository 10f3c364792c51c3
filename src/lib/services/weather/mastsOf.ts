import { selectAssignmentsOf } from '#db/queries/mastAssignments';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Span } from '../levels/spans';

/** The masts that a station went by in a period, each for its part of it, ascending. */
export async function mastsOf(
  stationId: number,
  { fromSec, toSec }: Span,
): Promise<{ code: string; name: string; from: string; to: string }[]> {
  const assignments = await selectAssignmentsOf(stationId, { fromSec, toSec });
  return assignments.map((one) => ({
    code: one.mastCode,
    name: one.mastName,
    from: formatInstantUtc(Math.max(fromSec, one.fromSec)),
    to: formatInstantUtc(Math.min(toSec, one.toSec ?? Infinity)),
  }));
}
