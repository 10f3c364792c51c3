import { pool, type Connection } from './connection';
import { inBuckets, type Buckets } from './onlyBuckets';

/** A station's day of UTC as bytes of its trace. */
export interface PackedTrace {
  outline: Buffer;
  shapes: Buffer;
}

export interface TraceDay {
  stationId: number;
  dayStartSec: number;
  /** Not made since something of it changed. */
  isWaiting: boolean;
}

/** Has days of a station made again: belongs in the transaction that recomputes them, with the station locked. */
export async function dropDayTraces(
  stationId: number,
  dayStartsSec: readonly number[],
  conn: Connection,
): Promise<void> {
  if (dayStartsSec.length === 0) return;
  const rows = dayStartsSec.map((startSec) => `(${stationId}, ${startSec})`);
  await conn.raw(
    `INSERT INTO station_day_traces (station_id, starts_at) VALUES ${rows.join(', ')}
     ON DUPLICATE KEY UPDATE outline = NULL, shapes = NULL, is_waiting = 1`,
  );
}

/** Drops traces of a station's days that begin at `fromSec` or later. */
export async function dropTracesFrom(stationId: number, fromSec: number, conn: Connection): Promise<void> {
  await conn('station_day_traces')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .delete();
}

/** Drops every trace of a station. */
export async function deleteDayTraces(stationId: number, conn: Connection): Promise<void> {
  await conn('station_day_traces').where({ station_id: stationId }).delete();
}

/** Days that wait to be made and ended before an instant, latest first, of stations of some buckets, but those of some stations. */
export async function listWaitingDays(
  endedBeforeSec: number,
  limit: number,
  { exceptStationIds = [], buckets = null }: { exceptStationIds?: readonly number[]; buckets?: Buckets } = {},
  conn: Connection = pool(),
): Promise<{ stationId: number; dayStartSec: number }[]> {
  return inBuckets('station_day_traces', buckets, conn)
    .where({ is_waiting: 1 })
    .whereNotIn('station_id', [...exceptStationIds])
    .where('starts_at', '<=', endedBeforeSec - 86_400)
    .orderBy('starts_at', 'desc')
    .limit(limit)
    .select({ stationId: 'station_id', dayStartSec: 'starts_at' });
}

/** Stores what a day came to; null: nothing was measured, and there is no row. */
export async function storeDayTrace(
  stationId: number,
  dayStartSec: number,
  trace: PackedTrace | null,
  conn: Connection,
): Promise<void> {
  const day = { station_id: stationId, starts_at: dayStartSec };
  if (trace === null) await conn('station_day_traces').where(day).delete();
  else
    await conn('station_day_traces')
      .where(day)
      .update({ outline: trace.outline, shapes: trace.shapes, is_waiting: 0 });
}

/** Days of a station that begin in `fromSec <= t < toSec` and are made or wait to be, ascending. */
export async function listTraceDays(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<TraceDay[]> {
  const rows: { starts_at: number; is_waiting: number }[] = await conn('station_day_traces')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .orderBy('starts_at')
    .select('starts_at', 'is_waiting');
  return rows.map((row) => ({ stationId, dayStartSec: row.starts_at, isWaiting: row.is_waiting === 1 }));
}

/** Days of UTC of a station from `fromSec` up to `toSec` with quarter-hours that wait for recomputation. */
export async function dirtyDays(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<number[]> {
  const [rows] = await conn
    .raw(
      `SELECT DISTINCT quarter_starts_at DIV 86400 * 86400 FROM dirty_marks
       WHERE station_id = ? AND quarter_starts_at >= ? AND quarter_starts_at < ?`,
      [stationId, fromSec, toSec],
    )
    .options({ rowsAsArray: true });
  return (rows as [number][]).map(([startSec]) => Number(startSec));
}

/** Outlines of made days of a station in `fromSec <= t < toSec`, ascending. */
export async function selectOutlines(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<[dayStartSec: number, outline: Buffer][]> {
  return selectBlobs('outline', stationId, `starts_at >= ${fromSec} AND starts_at < ${toSec}`, conn);
}

/** Shapes of these days of a station, ascending; a day that waits is left out. */
export async function selectShapes(
  stationId: number,
  dayStartsSec: readonly number[],
  conn: Connection = pool(),
): Promise<[dayStartSec: number, shapes: Buffer][]> {
  if (dayStartsSec.length === 0) return [];
  return selectBlobs('shapes', stationId, `starts_at IN (${dayStartsSec.join(', ')})`, conn);
}

async function selectBlobs(
  column: 'outline' | 'shapes',
  stationId: number,
  days: string,
  conn: Connection,
): Promise<[number, Buffer][]> {
  const [rows] = await conn
    .raw(
      `SELECT starts_at, ${column} FROM station_day_traces
       WHERE station_id = ? AND ${days} AND ${column} IS NOT NULL ORDER BY starts_at`,
      [stationId],
    )
    .options({ rowsAsArray: true });
  return rows as [number, Buffer][];
}
