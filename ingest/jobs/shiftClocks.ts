import { advanceClockShifts } from '#ingest/shiftClock/advance';

/** Moves the intervals of episodes of a wrong clock, or back. @returns how much it did. */
export function shiftClocks(): Promise<number> {
  return advanceClockShifts();
}
