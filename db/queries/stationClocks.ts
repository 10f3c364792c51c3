import { insertRows, pool, type Connection, type Writes } from './connection';

/** How far a monitor's clock was ahead of ours, in seconds, at its last two posts. */
export interface StationClock {
  stationId: number;
  aheadSec: number;
  aheadBeforeSec: number;
  notedAt: Date;
}

/** Notes what a post's `sentAt` tells of the monitor's clock. */
export async function noteClock(
  stationId: number,
  aheadSec: number,
  notedAt: Date,
  conn: Writes,
): Promise<void> {
  // The value before comes first: it is what the row holds so far.
  await insertRows(conn, {
    head: 'INSERT INTO station_clocks (station_id, ahead_sec, ahead_before_sec, noted_at)',
    rows: ['(?, ?, ?, ?)'],
    tail: `ON DUPLICATE KEY UPDATE ahead_before_sec = ahead_sec, ahead_sec = VALUES(ahead_sec), noted_at = VALUES(noted_at)`,
    bindings: [stationId, aheadSec, aheadSec, notedAt],
  });
}

/** Clocks of a network's stations that send their time. */
export async function listClocks(networkId: number, conn: Connection = pool()): Promise<StationClock[]> {
  return conn('station_clocks')
    .join('stations', 'stations.id', 'station_clocks.station_id')
    .where({ 'stations.network_id': networkId })
    .select({
      stationId: 'station_id',
      aheadSec: 'ahead_sec',
      aheadBeforeSec: 'ahead_before_sec',
      notedAt: 'noted_at',
    });
}
