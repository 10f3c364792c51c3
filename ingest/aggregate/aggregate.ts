import { inTransaction, type Connection } from '#db/queries/connection';
import { dropDayTraces } from '#db/queries/dayTraces';
import { deleteDirtyMarks, readDirtyMarks, type DirtyMark } from '#db/queries/dirtyMarks';
import { listSettings, type NetworkSettings } from '#db/queries/networks';
import type { Buckets } from '#db/queries/onlyBuckets';
import { findSeal } from '#db/queries/retention';
import { findStationById, lockStation, type StationRow } from '#db/queries/stations';
import { eachStation, restingStationIds } from '../jobs/stationsAlone';
import { chunksOf, marksByStation, type Chunk } from './chunks';
import { recompute } from './recompute';

/**
 * What follows from recomputed quarter-hours of a station, in the same transaction: the windows of limits that they are parts
 * of must be judged (again).
 */
export type OnQuartersRecomputed = (
  stationId: number,
  quarterStartsSec: number[],
  transaction: Connection,
) => Promise<void>;

export interface AggregationRun {
  /** Quarter-hours recomputed. */
  quarters: number;
  /** Marks that were read; as many as asked for when more may wait. */
  marks: number;
}

const JOB = 'aggregate';
/** Reads after the lock see all that was committed, and deleting marks locks no gap that monitors insert into. */
const AS_COMMITTED = { isolationLevel: 'read committed' } as const;
const DAY_SEC = 86_400;
/** Marks read at once. */
const MOST_MARKS = 5000;
/** Intervals that are recomputed in one transaction, unless a date has more: a week of minutes, some tenths of a second. */
const INTERVALS_A_CHUNK = 7 * 1440;

/**
 * Recomputes what is marked, oldest marks first, at most `mostMarks` of them, of stations of some buckets: each quarter-hour and the
 * periods of day it is part of wholly from intervals, in transactions of a station's date or a few. Marks are read before a
 * transaction's reads, and exactly those are deleted: what changes meanwhile has a mark of its own. Safe to run twice at once, because
 * the second finds the station locked and then recomputes the same from newer data. A station that cannot be recomputed is noted and
 * rests; its marks stay.
 */
export async function aggregateMarks(
  onQuartersRecomputed: OnQuartersRecomputed,
  { mostMarks = MOST_MARKS, buckets = null }: { mostMarks?: number; buckets?: Buckets } = {},
): Promise<AggregationRun> {
  const now = new Date();
  const marks = await readDirtyMarks(mostMarks, {
    exceptStationIds: await restingStationIds(JOB, now),
    buckets,
  });
  const byStation = marksByStation(marks);
  const quarters = await eachStation(
    JOB,
    byStation.keys(),
    (stationId) => aggregateStation(stationId, byStation.get(stationId) ?? [], onQuartersRecomputed),
    now,
  );
  return { quarters, marks: marks.length };
}

async function aggregateStation(
  stationId: number,
  marks: readonly DirtyMark[],
  onQuartersRecomputed: OnQuartersRecomputed,
): Promise<number> {
  const station = await findStationById(stationId);
  if (!station) return forget(stationId, marks);
  const { sealedBeforeSec } = await findSeal(stationId);
  const sealed = marks.filter(({ quarterStartSec }) => quarterStartSec < sealedBeforeSec);
  if (sealed.length > 0) {
    await forget(stationId, sealed);
    return aggregateStation(
      stationId,
      marks.filter((mark) => !sealed.includes(mark)),
      onQuartersRecomputed,
    );
  }
  const timeline = await listSettings(station.networkId);
  let quarters = 0;
  for (const chunk of chunksOf(stationId, marks, timeline, INTERVALS_A_CHUNK * station.intervalSec)) {
    await recomputeChunk(chunk, station, timeline, onQuartersRecomputed);
    quarters += chunk.quarterStartsSec.length;
  }
  return quarters;
}

/** Deletes marks of what is gone, or sealed and so never computed anew. */
async function forget(stationId: number, marks: readonly DirtyMark[]): Promise<number> {
  const ids = marks.map(({ id }) => id);
  await inTransaction((transaction) => deleteDirtyMarks(stationId, ids, transaction), AS_COMMITTED);
  return 0;
}

/** Recomputes until no mark is left that had been made when this began to look. Answers the quarter-hours recomputed. */
export async function aggregateAll(onQuartersRecomputed: OnQuartersRecomputed): Promise<number> {
  for (let quarters = 0; ;) {
    const run = await aggregateMarks(onQuartersRecomputed);
    quarters += run.quarters;
    if (run.marks < MOST_MARKS) return quarters;
  }
}

async function recomputeChunk(
  chunk: Chunk,
  station: StationRow,
  timeline: NetworkSettings[],
  onQuartersRecomputed: OnQuartersRecomputed,
): Promise<void> {
  await inTransaction(async (transaction) => {
    await lockStation(station.id, transaction);
    const computing = recompute(chunk, station, timeline, transaction);
    // The database does what does not need the result meanwhile.
    const settling = Promise.allSettled([
      dropDayTraces(station.id, daysOf(chunk), transaction),
      deleteDirtyMarks(station.id, chunk.markIds, transaction),
    ]);
    await computing;
    for (const settled of await settling) if (settled.status === 'rejected') throw settled.reason;
    await onQuartersRecomputed(station.id, chunk.quarterStartsSec, transaction);
  }, AS_COMMITTED);
}

/** Days of UTC that a chunk's marked quarter-hours are in, by their beginnings. */
function daysOf({ quarterStartsSec }: Chunk): number[] {
  return [...new Set(quarterStartsSec.map((startSec) => startSec - (startSec % DAY_SEC)))];
}
