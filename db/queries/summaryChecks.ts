import { pool, type Connection } from './connection';

interface Range {
  networkId: number;
  fromSec: number;
  toSec: number;
}

/** Refused records of a month that nobody has settled, by station. */
export async function countQuarantineWithin(
  { networkId, fromSec, toSec }: Range,
  conn: Connection = pool(),
): Promise<{ code: string; count: number }[]> {
  const rows: { code: string; count: number | string }[] = await conn('quarantine as q')
    .join('stations as s', 's.id', 'q.station_id')
    .where({ 's.network_id': networkId, 'q.settled_at': null })
    .where('q.starts_at', '>=', fromSec)
    .where('q.starts_at', '<', toSec)
    .groupBy('s.code')
    .orderBy('s.code')
    .select({ code: 's.code', count: conn.raw('COUNT(*)') });
  return rows.map((row) => ({ ...row, count: Number(row.count) }));
}

/** Quarter-hours of a month that wait for recomputation, over all stations. */
export async function countDirtyWithin(
  { networkId, fromSec, toSec }: Range,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('dirty_marks as m')
    .join('stations as s', 's.id', 'm.station_id')
    .where('s.network_id', networkId)
    .where('m.quarter_starts_at', '>=', fromSec)
    .where('m.quarter_starts_at', '<', toSec)
    .first({ count: conn.raw('COUNT(*)') });
  return Number(row.count);
}
