import { findClockShift } from '#db/queries/clockShifts';
import type { Connection } from '#db/queries/connection';
import type { StoredInterval } from '#db/queries/intervals';
import { selectShiftedIn } from '#db/queries/shiftedStarts';

/** A stored interval with the start that its monitor gave it: another one where a shift of the clock has moved it. */
export async function asSent(
  stationId: number,
  interval: StoredInterval,
  conn: Connection,
): Promise<StoredInterval> {
  const { startSec } = interval;
  const shiftId = (await selectShiftedIn(stationId, startSec, startSec + 1, conn)).get(startSec);
  const shift = shiftId === undefined ? undefined : await findClockShift(stationId, shiftId, conn);
  return shift ? { ...interval, startSec: startSec - shift.shiftSec } : interval;
}
