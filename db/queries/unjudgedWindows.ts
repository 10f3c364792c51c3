import { pool, type Connection } from './connection';

/** How many windows of limits at a station overlap `fromSec <= t < toSec` and wait to be judged. */
export async function countUnjudgedWindows(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('pending_windows')
    .where({ station_id: stationId })
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .select(conn.raw('COUNT(DISTINCT limit_id, starts_at) AS count'))
    .first();
  return Number(row?.count ?? 0);
}
