import { insertRows, pool, type Connection, type Writes } from './connection';

/** How far a monitor's clock was ahead of ours in a quarter-hour of ours, by the post with the shortest way. */
export interface ClockOffset {
  quarterStartSec: number;
  aheadSec: number;
}

/** Notes what a post's `sentAt` tells. A post on its way makes a clock look slower, never faster: the greatest counts. */
export async function noteOffset(
  stationId: number,
  { quarterStartSec, aheadSec }: ClockOffset,
  conn: Writes,
): Promise<void> {
  await insertRows(conn, {
    head: 'INSERT INTO clock_offsets (station_id, quarter_starts_at, ahead_sec)',
    rows: ['(?, ?, ?)'],
    tail: 'ON DUPLICATE KEY UPDATE ahead_sec = GREATEST(ahead_sec, VALUES(ahead_sec))',
    bindings: [stationId, quarterStartSec, aheadSec],
  });
}

/** Offsets of a station in quarter-hours that begin in `fromSec <= t < toSec`, ascending. */
export async function selectOffsets(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<ClockOffset[]> {
  return conn('clock_offsets')
    .where({ station_id: stationId })
    .where('quarter_starts_at', '>=', fromSec)
    .where('quarter_starts_at', '<', toSec)
    .orderBy('quarter_starts_at')
    .select({ quarterStartSec: 'quarter_starts_at', aheadSec: 'ahead_sec' });
}

/** Forgets offsets of quarter-hours before an instant. */
export async function deleteOffsetsBefore(beforeSec: number, conn: Connection = pool()): Promise<number> {
  return conn('clock_offsets').where('quarter_starts_at', '<', beforeSec).delete();
}
