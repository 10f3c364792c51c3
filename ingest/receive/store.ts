import type { Knex } from 'knex';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { insertIntervals, type StoredInterval } from '#db/queries/intervals';
import { insertQuarantined } from '#db/queries/quarantine';
import { noteLatest } from '#db/queries/stationLatest';
import { quartersTouching } from '#lib/time/quarters';
import type { KeptRecord } from './keptRecord';

/** Writes accepted intervals with what must be recomputed for them, and refused records. */
export async function store(
  stationId: number,
  accepted: readonly StoredInterval[],
  refused: readonly KeptRecord[],
  receivedAt: Date,
  transaction: Knex.Transaction,
): Promise<void> {
  await insertQuarantined(stationId, refused, receivedAt, transaction);
  const newest = newestOf(accepted);
  if (!newest) return;
  await insertIntervals(stationId, accepted, transaction);
  await insertDirtyMarks(stationId, touchedQuarters(accepted), transaction);
  await noteLatest({ ...newest, stationId, receivedAt }, transaction);
}

function newestOf(intervals: readonly StoredInterval[]): StoredInterval | undefined {
  return intervals.reduce<StoredInterval | undefined>(
    (newest, interval) => (newest && newest.startSec > interval.startSec ? newest : interval),
    undefined,
  );
}

function touchedQuarters(intervals: readonly StoredInterval[]): Set<number> {
  const quarters = new Set<number>();
  for (const { startSec, durationSec } of intervals) {
    for (const quarter of quartersTouching(startSec, startSec + durationSec)) quarters.add(quarter);
  }
  return quarters;
}
