import { pool, type Connection } from './connection';

/** Standing exceedances of a network by their limit, whose window begins in `fromSec <= t < toSec`. */
export async function countStandingByLimit(
  networkId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<Map<number, number>> {
  const rows: { limitId: number; count: number }[] = await conn('exceedances')
    .where({ network_id: networkId, state: 'standing' })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .groupBy('limit_id')
    .select({ limitId: 'limit_id' })
    .count({ count: '*' });
  return new Map(rows.map(({ limitId, count }) => [limitId, Number(count)]));
}

/** How many windows of a limit ended at or before an instant (epoch seconds) and wait to be judged, each counted once. */
export async function countClosedWindows(
  limitId: number,
  untilSec: number,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('pending_windows')
    .where({ limit_id: limitId })
    .where('ends_at', '<=', untilSec)
    .select(conn.raw('COUNT(DISTINCT station_id, starts_at) AS count'))
    .first();
  return Number(row?.count ?? 0);
}
