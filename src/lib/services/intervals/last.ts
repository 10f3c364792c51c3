import { selectStandingShifts, type StandingShift } from '#db/queries/clockShifts';
import { findGaps, findLastStart, type Gap } from '#db/queries/intervalGaps';
import { formatInstantUtc } from '#lib/contracts/common';
import type { LastInterval } from '#lib/contracts/intervals';

const GAPS_OF_SEC = 7 * 86_400;
const MOST_GAPS = 200;

/**
 * Where a monitor goes on: the last interval that its station has, and what is missing in the last seven days. All of it is in the
 * monitor's own time where a shift has corrected it: sending from the earlier of both ends costs at most what is known.
 */
export async function lastInterval(stationId: number, nowSec: number): Promise<LastInterval> {
  const [lastStartSec, gaps, shifts] = await Promise.all([
    findLastStart(stationId),
    findGaps(stationId, nowSec - GAPS_OF_SEC, MOST_GAPS),
    selectStandingShifts(stationId),
  ]);
  const lastStart = lastStartSec === null ? null : Math.min(...spokenOf(lastStartSec, shifts));
  return {
    lastStart: lastStart === null ? null : formatInstantUtc(lastStart),
    gaps: gaps
      .flatMap((gap) => gapsAsSent(gap, shifts))
      .map(({ fromSec, toSec }) => ({
        from: formatInstantUtc(fromSec),
        to: formatInstantUtc(toSec),
      })),
  };
}

/** Times at which a monitor may have spoken of an instant: the right one, and what a wrong clock showed. */
function spokenOf(sec: number, shifts: readonly StandingShift[]): number[] {
  const wrong = shifts.filter(
    ({ fromSec, toSec, shiftSec }) => sec >= fromSec + shiftSec && sec < toSec + shiftSec,
  );
  return [sec, ...wrong.map(({ shiftSec }) => sec - shiftSec)];
}

/** A gap, and its parts as a wrong clock showed them. */
function gapsAsSent(gap: Gap, shifts: readonly StandingShift[]): Gap[] {
  const parts = shifts.map(({ fromSec, toSec, shiftSec }) => ({
    fromSec: Math.max(gap.fromSec - shiftSec, fromSec),
    toSec: Math.min(gap.toSec - shiftSec, toSec),
  }));
  return [gap, ...parts.filter(({ fromSec, toSec }) => fromSec < toSec)];
}
