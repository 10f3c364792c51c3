import type { Knex } from 'knex';
import { selectStandingShifts, type StandingShift } from '#db/queries/clockShifts';
import type { StoredInterval } from '#db/queries/intervals';
import { selectShiftedIn } from '#db/queries/shiftedStarts';

type Stretch = Pick<StoredInterval, 'startSec' | 'durationSec'>;

/** What shifts of a station's clock say of the records of a post. */
export interface ClockRules {
  shifts: readonly StandingShift[];
  /** Which shift moved a stored interval, by its stored start. */
  movedBy: ReadonlyMap<number, number>;
}

/** Where a record may belong, and by which shift; null: where its monitor says. */
export interface Place {
  startSec: number;
  shiftId: number | null;
}

/** Intervals that a post concerns are being moved at the moment: the post can be taken when that is done. */
export class ShiftUnderWay extends Error {
  constructor() {
    super(
      'Intervals of this time are being moved, because the clock was wrong. Keep what you have and try again.',
    );
    this.name = 'ShiftUnderWay';
  }
}

/**
 * The shifts that concern records by the starts that their monitor gave; null where none does. The station is locked.
 * @throws {ShiftUnderWay} while one of them is being made or reversed.
 */
export async function clockRulesFor(
  stationId: number,
  records: readonly Stretch[],
  transaction: Knex.Transaction,
): Promise<ClockRules | null> {
  const standing = await selectStandingShifts(stationId, transaction);
  if (standing.some((shift) => shift.state !== 'moved' && records.some((record) => touches(shift, record)))) {
    throw new ShiftUnderWay();
  }
  const shifts = standing.filter((shift) => records.some(({ startSec }) => isOfEpisode(shift, startSec)));
  if (shifts.length === 0) return null;
  const movedBy = new Map<number, number>();
  for (const { fromSec, toSec, shiftSec } of shifts) {
    const moved = await selectShiftedIn(stationId, fromSec + shiftSec, toSec + shiftSec, transaction);
    for (const [startSec, shiftId] of moved) movedBy.set(startSec, shiftId);
  }
  return { shifts, movedBy };
}

/** Everywhere that a record may be stored, so that what is stored there can be read. */
export function possibleStretches(records: readonly Stretch[], rules: ClockRules | null): Stretch[] {
  if (!rules) return [...records];
  return records.flatMap((record) =>
    placesOf(record, rules).map(({ startSec }) => ({ startSec, durationSec: record.durationSec })),
  );
}

/**
 * Places of a record, the likelier first. A record of an episode belongs where the shift puts it. Some times came twice, once
 * wrong and once right: those that a fast clock showed last, which it showed again once it was put back, and those that a slow
 * one showed first, which it had shown before it fell back. Such a record may belong where its monitor says, too.
 */
export function placesOf({ startSec }: Stretch, rules: ClockRules | null): Place[] {
  const asSent = { startSec, shiftId: null };
  const shift = rules?.shifts.find((one) => isOfEpisode(one, startSec));
  if (!shift) return [asSent];
  const shifted = { startSec: startSec + shift.shiftSec, shiftId: shift.id };
  if (shift.shiftSec < 0 && startSec >= shift.toSec + shift.shiftSec) return [asSent, shifted];
  return startSec < shift.fromSec + shift.shiftSec ? [shifted, asSent] : [shifted];
}

/** Whether a stored interval came with the start that a place stands for. */
export function isFrom({ startSec, shiftId }: Place, rules: ClockRules | null): boolean {
  return (rules?.movedBy.get(startSec) ?? null) === shiftId;
}

const isOfEpisode = ({ fromSec, toSec }: StandingShift, startSec: number) =>
  startSec >= fromSec && startSec < toSec;

function touches({ fromSec, toSec, shiftSec }: StandingShift, { startSec, durationSec }: Stretch): boolean {
  const overlaps = (bySec: number) => startSec < toSec + bySec && startSec + durationSec > fromSec + bySec;
  return overlaps(0) || overlaps(shiftSec);
}
