import { type PeriodSums } from '#lib/acoustics/periodSums';
import { QUARTER_SEC } from '#lib/time/quarters';
import { bandRooms } from './aggregatePacking';
import {
  BAND_COLUMNS,
  cellsOfSums,
  instantCell,
  SUMS_COLUMNS,
  sumsOfCells,
  type SumsCells,
} from './aggregateSums';
import { pool, type Connection } from './connection';
import { insertPrepared } from './preparedInsert';
import { deleteRuns, runsOf } from './runs';

const INSERTED_COLUMNS = [
  'station_id',
  'starts_at',
  'flags',
  'reason_bits',
  'late_sec',
  'computed_at',
  ...SUMS_COLUMNS,
  ...BAND_COLUMNS,
];

/** One station's UTC quarter-hour, recomputed wholly from its intervals. A quarter without any interval has no row. */
export interface QuarterHour {
  startSec: number;
  /** Without distributions per band. */
  sums: PeriodSums;
  /** Flags seen, on valid intervals or not. */
  flagBits: number;
  /** Why seconds were left out: bit n is `INVALIDITY_REASONS[n]`. */
  reasonBits: number;
  lateSec: number;
}

/** Quarter-hours that begin in `fromSec <= t < toSec`, ascending. `bands: false` leaves out band sums, most of a row. */
export async function selectQuarterHours(
  stationId: number,
  fromSec: number,
  toSec: number,
  { bands }: { bands: boolean },
  conn: Connection = pool(),
): Promise<QuarterHour[]> {
  const columns = [...SUMS_COLUMNS, ...(bands ? BAND_COLUMNS : [])];
  const [rows] = await conn
    .raw(
      `SELECT starts_at, flags, reason_bits, late_sec, ${columns.join(', ')} FROM quarter_hours
       WHERE station_id = ? AND starts_at >= ? AND starts_at < ? ORDER BY starts_at`,
      [stationId, fromSec, toSec],
    )
    .options({ rowsAsArray: true });
  const found = rows as [number, number, number, number, ...SumsCells][];
  const roomOf = bands ? bandRooms(found.length) : () => undefined;
  return found.map(([startSec, flagBits, reasonBits, lateSec, ...cells], row) => ({
    startSec,
    flagBits,
    reasonBits,
    lateSec,
    sums: sumsOfCells(cells, roomOf(row)),
  }));
}

/** Beginnings of the computed quarter-hours of a station in `fromSec <= t < toSec`, ascending. */
export async function selectQuarterStarts(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<number[]> {
  return conn('quarter_hours')
    .where({ station_id: stationId })
    .where('starts_at', '>=', fromSec)
    .where('starts_at', '<', toSec)
    .orderBy('starts_at')
    .pluck('starts_at');
}

/** Drops a station's rows of these quarters. */
export async function deleteQuartersAt(
  stationId: number,
  quarterStartsSec: readonly number[],
  conn: Connection,
): Promise<void> {
  const runs = runsOf(quarterStartsSec, QUARTER_SEC);
  await deleteRuns({ table: 'quarter_hours', stationId, column: 'starts_at' }, runs, conn);
}

/** Adds quarter-hours of a station that have no rows. */
export async function insertQuarterHours(
  stationId: number,
  quarters: readonly QuarterHour[],
  conn: Connection,
): Promise<void> {
  const computedAt = instantCell(new Date());
  await insertPrepared(conn, {
    table: 'quarter_hours',
    columns: INSERTED_COLUMNS,
    rows: quarters.map(({ startSec, flagBits, reasonBits, lateSec, sums }) => [
      stationId,
      startSec,
      flagBits,
      reasonBits,
      lateSec,
      computedAt,
      ...cellsOfSums(sums),
    ]),
  });
}

/** Drops every quarter-hour of a station that begins at `fromSec` or later. */
export async function deleteQuarterHours(
  stationId: number,
  fromSec: number,
  conn: Connection,
): Promise<void> {
  await conn('quarter_hours').where({ station_id: stationId }).where('starts_at', '>=', fromSec).delete();
}

/** Marks for recomputation every computed quarter-hour of a station that begins in `fromSec <= t < toSec`. */
export async function markQuarterHours(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection,
): Promise<void> {
  await conn.raw(
    `INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at)
     SELECT station_id, starts_at, ? FROM quarter_hours WHERE station_id = ? AND starts_at >= ? AND starts_at < ?`,
    [Math.floor(Date.now() / 1000), stationId, fromSec, toSec],
  );
}

/** Marks for recomputation every quarter-hour that an interval of a station touches. */
export async function markMeasuredQuarters(stationId: number, conn: Connection): Promise<void> {
  // An interval lasts an hour at most, so it touches five quarter-hours at most.
  await conn.raw(
    `INSERT INTO dirty_marks (station_id, quarter_starts_at, marked_at)
     SELECT DISTINCT station_id, (starts_at DIV 900 + steps.n) * 900, ? FROM interval_levels
     JOIN (SELECT 0 AS n UNION ALL SELECT 1 UNION ALL SELECT 2 UNION ALL SELECT 3 UNION ALL SELECT 4) AS steps
       ON (starts_at DIV 900 + steps.n) * 900 < starts_at + duration_sec
     WHERE station_id = ?`,
    [Math.floor(Date.now() / 1000), stationId],
  );
}
