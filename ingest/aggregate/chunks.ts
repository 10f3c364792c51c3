import { type DirtyMark } from '#db/queries/dirtyMarks';
import { type NetworkSettings } from '#db/queries/networks';
import { type PeriodInstance } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import { periodsTouching } from '#lib/services/levels/datePeriods';

const DAY_SEC = 86_400;

/** Marked quarter-hours of one station that are recomputed in one transaction, with the periods they are parts of. */
export interface Chunk {
  stationId: number;
  /** Exactly the marks that are done with this chunk. */
  markIds: number[];
  /** Ascending, each once. */
  quarterStartsSec: number[];
  /** Whole days, evenings and nights that any of the quarters touches. */
  periods: PeriodInstance[];
}

/** Marks by station. */
export function marksByStation(marks: readonly DirtyMark[]): Map<number, DirtyMark[]> {
  const byStation = new Map<number, DirtyMark[]>();
  for (const mark of marks) {
    const others = byStation.get(mark.stationId);
    if (others) others.push(mark);
    else byStation.set(mark.stationId, [mark]);
  }
  return byStation;
}

/**
 * Parts the marks of one station between the local dates that their periods begin on, so that no period is computed twice.
 * Dates that follow each other stay together while they last no more than about `mostSec`: a transaction costs as much as a day of
 * minutes, but holds the station while it works.
 */
export function chunksOf(
  stationId: number,
  marks: readonly DirtyMark[],
  timeline: NetworkSettings[],
  mostSec: number,
): Chunk[] {
  const chunks: Chunk[] = [];
  let periods: PeriodInstance[] = [];
  let date = '';
  let chunk: Chunk | undefined;
  for (const { id, quarterStartSec } of [...marks].sort((a, b) => a.quarterStartSec - b.quarterStartSec)) {
    const endSec = quarterStartSec + QUARTER_SEC;
    if ((periods.at(-1)?.toSec ?? -Infinity) < endSec) {
      periods = periodsTouching(quarterStartSec, quarterStartSec + DAY_SEC, timeline);
    }
    const touched = periods.filter((p) => p.fromSec < endSec && quarterStartSec < p.toSec);
    const ofDate = touched[0]?.date ?? '';
    if (!chunk || (ofDate !== date && !continues(chunk, touched, mostSec))) {
      chunk = { stationId, markIds: [], quarterStartsSec: [], periods: [] };
      chunks.push(chunk);
    }
    date = ofDate;
    chunk.markIds.push(id);
    if (chunk.quarterStartsSec.at(-1) !== quarterStartSec) chunk.quarterStartsSec.push(quarterStartSec);
    for (const period of touched) {
      if (!chunk.periods.some((had) => had.date === period.date && had.kind === period.kind)) {
        chunk.periods.push(period);
      }
    }
  }
  return chunks;
}

/** Whether some periods follow a chunk's at once and last no longer than `mostSec` together with them. */
function continues({ periods }: Chunk, touched: readonly PeriodInstance[], mostSec: number): boolean {
  const [first, last] = [periods[0], periods.at(-1)];
  const [next, end] = [touched[0], touched.at(-1)];
  if (!first || !last || !next || !end) return false;
  return next.fromSec <= last.toSec && end.toSec - first.fromSec <= mostSec;
}
