import { insertRows, pool, type Connection, type Writes } from './connection';
import { inBuckets, type Buckets } from './onlyBuckets';
import { deleteRuns, runsOf } from './runs';

/** One quarter-hour of a station that must be recomputed; several marks may name the same one. */
export interface DirtyMark {
  id: number;
  stationId: number;
  quarterStartSec: number;
}

/** Marks quarter-hours of a station; belongs in the transaction of the change that makes them dirty. */
export async function insertDirtyMarks(
  stationId: number,
  quarterStartsSec: Iterable<number>,
  conn: Writes,
): Promise<void> {
  const markedAt = Math.floor(Date.now() / 1000);
  const rows = Array.from(quarterStartsSec, (quarter) => `(${stationId}, ${quarter}, ${markedAt})`);
  for (let first = 0; first < rows.length; first += 1000) {
    await insertRows(conn, {
      head: 'INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at)',
      rows: rows.slice(first, first + 1000),
    });
  }
}

/** The oldest marks, at most `limit`, of stations of some buckets, but those of some stations. */
export async function readDirtyMarks(
  limit: number,
  { exceptStationIds = [], buckets = null }: { exceptStationIds?: readonly number[]; buckets?: Buckets } = {},
  conn: Connection = pool(),
): Promise<DirtyMark[]> {
  return inBuckets('dirty_marks', buckets, conn)
    .whereNotIn('station_id', [...exceptStationIds])
    .orderBy('id')
    .limit(limit)
    .select({ id: 'id', stationId: 'station_id', quarterStartSec: 'quarter_starts_at' });
}

/** Deletes exactly these marks of a station: one that came meanwhile stays. Ids are the station's own: another's mark may have the same. */
export async function deleteDirtyMarks(
  stationId: number,
  ids: readonly number[],
  conn: Connection,
): Promise<void> {
  await deleteRuns({ table: 'dirty_marks', stationId, column: 'id' }, runsOf(ids, 1), conn);
}

/** Quarter-hours of a station that begin in `fromSec <= t < toSec` and wait for recomputation; sealed ones never do. */
export async function dirtyQuartersIn(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Set<number>> {
  const quarters: number[] = await conn('dirty_marks')
    .where({ station_id: stationId })
    .where('quarter_starts_at', '>=', fromSec)
    .where('quarter_starts_at', '<', toSec)
    .whereRaw(
      'quarter_starts_at >= COALESCE((SELECT sealed_before FROM sealed_stations WHERE sealed_stations.station_id = ?), 0)',
      [stationId],
    )
    .distinct()
    .pluck('quarter_starts_at');
  return new Set(quarters);
}

/** Marks every quarter-hour of a network's stations that has been computed and ends after an instant. */
export async function markNetworkFrom(networkId: number, fromSec: number, conn: Connection): Promise<void> {
  await conn.raw(
    `INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at)
     SELECT quarter_hours.station_id, quarter_hours.starts_at, ?
     FROM stations JOIN quarter_hours ON quarter_hours.station_id = stations.id
     WHERE stations.network_id = ? AND quarter_hours.starts_at > ?`,
    [Math.floor(Date.now() / 1000), networkId, fromSec - 900],
  );
}
