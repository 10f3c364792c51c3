import { listClockShifts } from '#db/queries/clockShifts';
import { type ClockShift } from '#lib/contracts/clockShifts';
import { clockShiftJson } from './clockShiftJson';

/** Shifts of a station's clock, reversed ones too, latest first. */
export async function clockShifts(stationId: number): Promise<ClockShift[]> {
  return (await listClockShifts(stationId)).map(clockShiftJson);
}
