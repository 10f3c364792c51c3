import type { Writes } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertIntervals, type StoredInterval } from '#db/queries/intervals';
import { insertQuarantined, insertQuarantinedOfImport } from '#db/queries/quarantine';
import { noteLatest } from '#db/queries/stationLatest';
import { QUARTER_SEC, quartersTouching } from '#lib/time/quarters';
import type { KeptRecord } from './keptRecord';

/**
 * Writes accepted intervals with what must be recomputed for them, and refused records: of a post, or of an import, which
 * says nothing about when the station last posted.
 */
export async function store(
  stationId: number,
  accepted: readonly StoredInterval[],
  refused: readonly KeptRecord[],
  receivedAt: Date,
  transaction: Writes,
  importId: number | null = null,
): Promise<void> {
  if (importId === null) await insertQuarantined(stationId, refused, receivedAt, transaction);
  else await insertQuarantinedOfImport(importId, stationId, refused, receivedAt, transaction);
  const newest = newestOf(accepted);
  if (!newest) return;
  await insertIntervals(stationId, accepted, transaction, importId);
  await insertDirtyMarks(stationId, touchedQuarters(accepted), transaction);
  const isPost = importId === null;
  const notedAt = isPost ? receivedAt : new Date((newest.startSec + newest.durationSec) * 1000);
  await noteLatest({ ...newest, stationId, receivedAt: notedAt }, transaction, isPost);
}

function newestOf(intervals: readonly StoredInterval[]): StoredInterval | undefined {
  return intervals.reduce<StoredInterval | undefined>(
    (newest, interval) => (newest && newest.startSec > interval.startSec ? newest : interval),
    undefined,
  );
}

function touchedQuarters(intervals: readonly StoredInterval[]): Set<number> {
  const quarters = new Set<number>();
  let lastEndSec = -Infinity;
  let lastQuarterSec = Infinity;
  for (const { startSec, durationSec } of intervals) {
    const endSec = startSec + durationSec;
    // Most lie in the quarter that the one before has marked.
    if (startSec >= lastQuarterSec && endSec <= lastEndSec) continue;
    for (const quarter of quartersTouching(startSec, endSec)) {
      quarters.add(quarter);
      lastQuarterSec = quarter;
      lastEndSec = quarter + QUARTER_SEC;
    }
  }
  return quarters;
}
