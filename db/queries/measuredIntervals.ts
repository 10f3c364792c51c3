import { pool, type Connection } from './connection';
import { MEASURED_COLUMNS, measuredOfCells, type MeasuredCells, type MeasuredInterval } from './intervalRows';
import { LONGEST_INTERVAL_SEC } from './intervals';
import { runPrepared } from './prepared';

const SELECT = `SELECT ${MEASURED_COLUMNS} FROM interval_levels
  WHERE station_id = ? AND starts_at > ? AND starts_at < ? AND starts_at + duration_sec > ? ORDER BY starts_at`;

/**
 * Every interval of a station that overlaps `fromSec <= t < toSec`, ascending: the first may begin before it, the last end after it.
 * As `selectIntervals`, of what figures need and by a prepared statement, in about two thirds of its time.
 */
export async function selectMeasuredIntervals(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<MeasuredInterval[]> {
  const cells = [stationId, fromSec - LONGEST_INTERVAL_SEC, toSec, fromSec];
  const [rows] = await runPrepared(conn, [{ statement: SELECT, cells }]);
  return measuredOfCells(rows as MeasuredCells[], conn);
}
