import { pool, type Connection } from './connection';

/** Stations that keep intervals from before an instant on, or may store some: not sealed so far by then. */
const KEEPERS = `stations.id NOT IN (SELECT station_id FROM sealed_stations WHERE sealed_at <= ? AND kept_from >= ?)`;

/** Whether any station was sealed by then and keeps nothing that begins before an instant. */
export async function hasSealed(
  sealedBy: Date,
  beforeSec: number,
  conn: Connection = pool(),
): Promise<boolean> {
  const row = await conn('sealed_stations')
    .where('sealed_at', '<=', sealedBy)
    .where('kept_from', '>=', beforeSec)
    .first('station_id');
  return row !== undefined;
}

/** Whether any station has intervals that begin before an instant and are kept. */
export async function hasIntervalsKept(
  beforeSec: number,
  sealedBy: Date,
  conn: Connection = pool(),
): Promise<boolean> {
  const [[row]] = (await conn.raw(
    `SELECT EXISTS (SELECT 1 FROM stations WHERE ${KEEPERS} AND EXISTS (
       SELECT 1 FROM interval_levels WHERE interval_levels.station_id = stations.id AND interval_levels.starts_at < ?)) AS kept`,
    [sealedBy, beforeSec, beforeSec],
  )) as [{ kept: number }[]];
  return row?.kept === 1;
}

/** Locks the stations that may store intervals which begin before an instant, as everybody does who stores some. */
export async function lockKeepers(beforeSec: number, sealedBy: Date, transaction: Connection): Promise<void> {
  const ids: number[] = await transaction('stations')
    .whereRaw(KEEPERS, [sealedBy, beforeSec])
    .orderBy('id')
    .pluck('id');
  if (ids.length === 0) return;
  await transaction('station_locks').whereIn('station_id', ids).orderBy('station_id').forUpdate().select();
}
