import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import type { Connection } from '#db/queries/connection';
import { quartersTouching } from '#lib/time/quarters';

/** Intervals that one transaction moves. */
export const ROWS_A_CHUNK = 2000;

interface Stretch {
  startSec: number;
  durationSec: number;
}

/** From the earliest beginning of some stretches to their latest end, `bySec` later. */
export function extentOf(stretches: readonly Stretch[], bySec: number): { fromSec: number; toSec: number } {
  let fromSec = Infinity;
  let toSec = -Infinity;
  for (const { startSec, durationSec } of stretches) {
    fromSec = Math.min(fromSec, startSec + bySec);
    toSec = Math.max(toSec, startSec + durationSec + bySec);
  }
  return { fromSec, toSec };
}

/** Marks what stretches touch for recomputation, where they were and where they are then. */
export async function markMoved(
  stationId: number,
  stretches: readonly Stretch[],
  shiftSec: number,
  transaction: Connection,
): Promise<void> {
  const quarters = new Set<number>();
  for (const { startSec, durationSec } of stretches) {
    for (const bySec of [0, shiftSec]) {
      const fromSec = startSec + bySec;
      for (const quarter of quartersTouching(fromSec, fromSec + durationSec)) quarters.add(quarter);
    }
  }
  await insertDirtyMarks(stationId, quarters, transaction);
}
