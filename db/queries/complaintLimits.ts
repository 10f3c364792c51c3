import { pool, type Connection } from './connection';

/** How many limits are set for a station at some time of `fromSec <= t < toSec`, whatever their days and hours. */
export async function countLimitsOfStation(
  networkId: number,
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('limits as l')
    .join('limit_versions as v', 'v.limit_id', 'l.id')
    .where({ 'l.network_id': networkId })
    .where('v.effective_from', '<', toSec)
    .whereRaw('(l.withdrawn_at IS NULL OR l.withdrawn_at > FROM_UNIXTIME(?))', [fromSec])
    .whereRaw(`(v.station_ids IS NULL OR JSON_CONTAINS(v.station_ids, ?))`, [String(stationId)])
    .whereNotExists(
      conn('limit_versions as later')
        .whereRaw('later.limit_id = v.limit_id AND later.effective_from > v.effective_from')
        .where('later.effective_from', '<=', fromSec)
        .select(conn.raw('1')),
    )
    .countDistinct({ count: 'l.id' })
    .first();
  return Number(row?.count ?? 0);
}

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
