import { findWorkingShift } from '#db/queries/clockShifts';
import { moveShift } from './move';
import { reverseShift } from './reverse';

const ROUND_MS = 5000;

/** Does a bounded part of the oldest shift that is being made or reversed. @returns how much it did; 0 when nothing waits. */
export async function advanceClockShifts(): Promise<number> {
  const shift = await findWorkingShift();
  if (!shift) return 0;
  const endsAtMs = Date.now() + ROUND_MS;
  const isOver = () => Date.now() > endsAtMs;
  return shift.state === 'moving' ? moveShift(shift, isOver) : reverseShift(shift, isOver);
}
