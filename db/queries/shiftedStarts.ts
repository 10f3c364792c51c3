import { pool, type Connection, type Writes } from './connection';
import type { ClockEpisode } from './clockShifts';

/** Where an interval is stored and for how long, and whether a shift of the clock has moved it. */
export interface StoredStretch {
  startSec: number;
  durationSec: number;
  receivedAtSec: number;
  /** The shift that moved it; null: none did. */
  shiftId: number | null;
}

const STRETCHES = `SELECT i.starts_at AS startSec, i.duration_sec AS durationSec, i.received_at AS receivedAtSec, c.shift_id AS shiftId
  FROM interval_levels AS i
  LEFT JOIN clock_shift_starts AS c ON c.station_id = i.station_id AND c.starts_at = i.starts_at`;

/** Stretches of a station's intervals that begin in `fromSec <= t < toSec`, ascending. */
export async function selectStretches(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<StoredStretch[]> {
  const [rows] = await conn.raw(
    `${STRETCHES} WHERE i.station_id = ? AND i.starts_at >= ? AND i.starts_at < ? ORDER BY i.starts_at`,
    [stationId, fromSec, toSec],
  );
  return rows;
}

/** How many intervals of a station begin in `fromSec <= t < toSec`. */
export async function countStarts(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<number> {
  const row = await conn('interval_levels')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .first({ count: conn.raw('COUNT(*)') });
  return Number(row.count);
}

const OF_EPISODE = `station_id = ? AND starts_at >= ? AND starts_at < ? AND received_at >= ? AND NOT EXISTS (
  SELECT 1 FROM clock_shift_starts AS c
  WHERE c.station_id = interval_levels.station_id AND c.starts_at = interval_levels.starts_at)`;

/** Intervals of an episode that have not been moved, at most `limit`: the last first where they move on, the first where back. */
export async function nextOfEpisode(
  stationId: number,
  { fromSec, toSec, shiftSec, receivedFromSec }: ClockEpisode,
  limit: number,
  conn: Connection,
): Promise<Pick<StoredStretch, 'startSec' | 'durationSec'>[]> {
  const [rows] = await conn.raw(
    `SELECT starts_at AS startSec, duration_sec AS durationSec FROM interval_levels WHERE ${OF_EPISODE}
     ORDER BY starts_at ${orderOf(shiftSec)} LIMIT ?`,
    [stationId, fromSec, toSec, receivedFromSec, limit],
  );
  return rows;
}

/** Moves the intervals of an episode, one by one in an order in which none meets another. */
export async function moveEpisode(
  stationId: number,
  { fromSec, toSec, shiftSec, receivedFromSec }: ClockEpisode,
  conn: Connection,
): Promise<void> {
  await conn.raw(
    `UPDATE interval_levels SET starts_at = CAST(starts_at AS SIGNED) + ? WHERE ${OF_EPISODE} ORDER BY starts_at ${orderOf(shiftSec)}`,
    [shiftSec, stationId, fromSec, toSec, receivedFromSec],
  );
}

/** Moves the interval of each given start; the order is the caller's. */
export async function moveStarts(
  stationId: number,
  startsSec: readonly number[],
  shiftSec: number,
  conn: Connection,
): Promise<void> {
  if (startsSec.length === 0) return;
  await conn.raw(
    `UPDATE interval_levels SET starts_at = CAST(starts_at AS SIGNED) + ? WHERE station_id = ?
     AND starts_at IN (${startsSec.join(', ')}) ORDER BY starts_at ${orderOf(shiftSec)}`,
    [shiftSec, stationId],
  );
}

const orderOf = (shiftSec: number) => (shiftSec > 0 ? 'DESC' : 'ASC');

const ROWS_A_STATEMENT = 1000;

/** Notes intervals, by their stored starts, as moved by a shift; `isLate`: they came after it was made. */
export async function noteShifted(
  stationId: number,
  starts: readonly { startSec: number; shiftId: number }[],
  isLate: boolean,
  conn: Writes,
): Promise<void> {
  for (let first = 0; first < starts.length; first += ROWS_A_STATEMENT) {
    const rows = starts
      .slice(first, first + ROWS_A_STATEMENT)
      .map(({ startSec, shiftId }) => `(${stationId}, ${startSec}, ${shiftId}, ${isLate ? 1 : 0})`);
    await conn.raw(
      `INSERT INTO clock_shift_starts (station_id, starts_at, shift_id, is_late) VALUES ${rows.join(', ')}`,
    );
  }
}

/** Forgets that intervals of these starts were moved. */
export async function forgetShifted(
  stationId: number,
  startsSec: readonly number[],
  conn: Connection,
): Promise<void> {
  if (startsSec.length === 0) return;
  await conn('clock_shift_starts')
    .where({ station_id: stationId })
    .whereIn('starts_at', [...startsSec])
    .delete();
}

export interface ShiftedStretch {
  startSec: number;
  durationSec: number;
  isLate: number;
}

/** Intervals that a shift moved, at most `limit`, in the order in which they can go back. */
export async function nextShifted(
  { id, shiftSec }: { id: number; shiftSec: number },
  limit: number,
  conn: Connection,
): Promise<ShiftedStretch[]> {
  const [rows] = await conn.raw(
    `SELECT i.starts_at AS startSec, i.duration_sec AS durationSec, c.is_late AS isLate
     FROM clock_shift_starts AS c
     JOIN interval_levels AS i ON i.station_id = c.station_id AND i.starts_at = c.starts_at
     WHERE c.shift_id = ? ORDER BY c.starts_at ${orderOf(-shiftSec)} LIMIT ?`,
    [id, limit],
  );
  return rows;
}

/** Which shift moved the intervals that begin in `fromSec <= t < toSec`, by their stored start. */
export async function selectShiftedIn(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection,
): Promise<Map<number, number>> {
  const rows: { startSec: number; shiftId: number }[] = await conn('clock_shift_starts')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .select({ startSec: 'starts_at', shiftId: 'shift_id' });
  return new Map(rows.map(({ startSec, shiftId }) => [startSec, shiftId]));
}

/** Whether a shift has moved any interval that an import stored. */
export async function hasShiftedOfImport(
  stationId: number,
  importId: number,
  conn: Connection,
): Promise<boolean> {
  const row = await conn({ c: 'clock_shift_starts' })
    .join({ i: 'interval_levels' }, (on) =>
      on.on('i.station_id', 'c.station_id').andOn('i.starts_at', 'c.starts_at'),
    )
    .where({ 'c.station_id': stationId, 'i.import_id': importId })
    .first('c.starts_at');
  return row !== undefined;
}
