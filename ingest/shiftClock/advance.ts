import { findWorkingShift, type ClockShiftRow } from '#db/queries/clockShifts';
import { eachAlone, restingNumbers } from '../jobs/alone';
import { moveShift } from './move';
import { reverseShift } from './reverse';

const JOB = 'shift-clocks';
const ROUND_MS = 5000;

/**
 * Does a bounded part of the oldest shift that is being made or reversed; one that fails rests, and the next goes on.
 * @returns how much it did; 0 when nothing waits.
 */
export async function advanceClockShifts(): Promise<number> {
  const now = new Date();
  const shift = await findWorkingShift(await restingNumbers(JOB, 'shift', now));
  if (!shift) return 0;
  const subject = { name: `shift ${shift.id}`, networkId: shift.networkId };
  return eachAlone(JOB, [shift], () => subject, advanceOne, now);
}

function advanceOne(shift: ClockShiftRow): Promise<number> {
  const endsAtMs = Date.now() + ROUND_MS;
  const isOver = () => Date.now() > endsAtMs;
  return shift.state === 'moving' ? moveShift(shift, isOver) : reverseShift(shift, isOver);
}
