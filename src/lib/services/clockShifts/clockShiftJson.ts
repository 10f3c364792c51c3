import { type ClockShiftRow } from '#db/queries/clockShifts';
import { type ClockShift } from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';

/** A shift of a clock as the interface gives it. */
export function clockShiftJson(row: ClockShiftRow): ClockShift {
  return {
    id: row.id,
    from: formatInstantUtc(row.fromSec),
    to: formatInstantUtc(row.toSec),
    shiftSeconds: row.shiftSec,
    receivedFrom: row.receivedFromSec === 0 ? null : formatInstantUtc(row.receivedFromSec),
    reason: row.reason,
    state: row.state,
    plannedCount: row.plannedCount,
    movedCount: row.movedCount,
    asideCount: row.asideCount,
    problem: row.problem,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    reversal: row.reversalReason === null ? null : { by: row.reversedByName, reason: row.reversalReason },
    finishedAt: row.finishedAt?.toISOString() ?? null,
  };
}
