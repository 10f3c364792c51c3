import { pool, type Connection } from './connection';
import { onlyBuckets, type Buckets } from './onlyBuckets';

/** A window of a limit at a station that must be judged, once it has closed, or again. */
export interface NewPendingWindow {
  limitId: number;
  stationId: number;
  startSec: number;
  endSec: number;
}

export interface PendingWindow extends NewPendingWindow {
  id: number;
}

const COLUMNS = {
  id: 'id',
  limitId: 'limit_id',
  stationId: 'station_id',
  startSec: 'starts_at',
  endSec: 'ends_at',
};

/** Adds windows to judge; the same window may wait several times and is judged once. */
export async function insertPendingWindows(
  windows: readonly NewPendingWindow[],
  conn: Connection,
): Promise<void> {
  const rows = windows.map(({ limitId, stationId, startSec, endSec }) => ({
    limit_id: limitId,
    station_id: stationId,
    starts_at: startSec,
    ends_at: endSec,
  }));
  for (let first = 0; first < rows.length; first += 1000) {
    await conn('pending_windows').insert(rows.slice(first, first + 1000));
  }
}

/** Windows of a station that wait and end after an instant (epoch seconds), each once. */
export async function selectOpenWindows(
  stationId: number,
  endsAfterSec: number,
  conn: Connection,
): Promise<NewPendingWindow[]> {
  return conn('pending_windows')
    .where({ station_id: stationId })
    .where('ends_at', '>', endsAfterSec)
    .distinct({ limitId: 'limit_id', stationId: 'station_id', startSec: 'starts_at', endSec: 'ends_at' });
}

/** How the windows of a limit at a station are named together. */
export const placeOfWindow = ({ limitId, stationId }: Pick<PendingWindow, 'limitId' | 'stationId'>) =>
  `limit ${limitId} at station ${stationId}`;

/**
 * Windows that ended at or before `untilSec`, the longest ended first, at most `limit`, of stations of some buckets, but
 * those of some places (`placeOfWindow`).
 */
export async function findDueWindows(
  untilSec: number,
  limit: number,
  { exceptPlaces = [], buckets = null }: { exceptPlaces?: readonly string[]; buckets?: Buckets } = {},
  conn: Connection = pool(),
): Promise<PendingWindow[]> {
  const due = conn('pending_windows')
    .where('ends_at', '<=', untilSec)
    .modify(onlyBuckets, buckets)
    .orderBy(['ends_at', 'id'])
    .limit(limit)
    .select(COLUMNS);
  if (exceptPlaces.length === 0) return due;
  const place = "CONCAT('limit ', limit_id, ' at station ', station_id)";
  return due.whereRaw(`${place} NOT IN (${exceptPlaces.map(() => '?').join(', ')})`, [...exceptPlaces]);
}

/** Those of the windows that still wait, locked until the transaction ends. */
export async function lockPendingWindows(
  ids: readonly number[],
  transaction: Connection,
): Promise<PendingWindow[]> {
  return transaction('pending_windows').whereIn('id', ids).orderBy('id').forUpdate().select(COLUMNS);
}

/** Deletes exactly these: one that came meanwhile stays. */
export async function deletePendingWindows(ids: readonly number[], transaction: Connection): Promise<void> {
  await transaction('pending_windows').whereIn('id', ids).delete();
}
