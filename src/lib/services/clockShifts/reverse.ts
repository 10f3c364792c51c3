import { appendAudit } from '#db/queries/audit';
import { findClockShift, lockClockShift, updateClockShift } from '#db/queries/clockShifts';
import { inTransaction } from '#db/queries/connection';
import { lockStation, type StationRow } from '#db/queries/stations';
import { type ClockShift } from '#lib/contracts/clockShifts';
import { done, unknown, type Outcome } from '../outcome';
import { requireUnsealed } from '../retention/seal';
import { readShift } from './make';

/** Has the worker put back everything that a shift moved. */
export async function reverseShift(
  station: StationRow,
  id: number,
  reason: string,
  userId: string,
): Promise<Outcome<ClockShift>> {
  if (!(await findClockShift(station.id, id))) return unknown('This station has no such shift.');
  return inTransaction<Outcome<ClockShift>>(async (transaction) => {
    await lockStation(station.id, transaction);
    const { state, fromSec, shiftSec } = await lockClockShift(id, transaction);
    if (state === 'reversing' || state === 'reversed') {
      return { kind: 'before', code: 'reversed-before', detail: 'The shift has been reversed before.' };
    }
    await requireUnsealed(station.id, Math.min(fromSec, fromSec + shiftSec), transaction);
    await updateClockShift(
      id,
      { state: 'reversing', reversedBy: userId, reversalReason: reason, finishedAt: null },
      transaction,
    );
    await appendAudit(
      {
        userId,
        networkId: station.networkId,
        action: 'clock-shift.reverse',
        subject: `station ${station.code}`,
        detail: { shift: id, reason },
      },
      transaction,
    );
    return done(await readShift(station.id, id, transaction));
  });
}
