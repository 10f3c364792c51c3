import { insertRows, pool, type Connection, type Writes } from './connection';
import {
  INTERVAL_COLUMNS,
  intervalCellsText,
  intervalsOfCells,
  type IntervalCells,
  type NewInterval,
  type StoredInterval,
} from './intervalRows';

export type { NewInterval, StoredInterval };

/** Longest interval that is stored. */
export const LONGEST_INTERVAL_SEC = 3600;

/**
 * Every interval of a station that overlaps `fromSec <= t < toSec`, ascending: the first may begin before it, the last end
 * after it. `limit` bounds the rows.
 */
export async function selectIntervals(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
  limit?: number,
): Promise<StoredInterval[]> {
  const [rows] = await conn
    .raw(selectIntervalsText(stationId, fromSec, toSec) + (limit === undefined ? '' : ` LIMIT ${limit}`))
    .options({ rowsAsArray: true });
  return intervalsOfCells(rows as IntervalCells[], conn);
}

/** The statement that reads them, as rows of `IntervalCells`. */
function selectIntervalsText(stationId: number, fromSec: number, toSec: number): string {
  return `SELECT ${INTERVAL_COLUMNS} FROM interval_levels
    WHERE station_id = ${stationId} AND starts_at > ${fromSec - LONGEST_INTERVAL_SEC} AND starts_at < ${toSec}
      AND starts_at + duration_sec > ${fromSec}
    ORDER BY starts_at`;
}

const ROWS_A_STATEMENT = 600;

/**
 * Adds intervals of a station, of an import or of a post (`null`). A start that exists fails the whole statement; nothing is
 * clamped or replaced.
 */
export async function insertIntervals(
  stationId: number,
  intervals: readonly NewInterval[],
  conn: Writes,
  importId: number | null = null,
): Promise<void> {
  const leading = `${stationId}, ${importId ?? 'NULL'}`;
  for (let first = 0; first < intervals.length; first += ROWS_A_STATEMENT) {
    const rows = intervals
      .slice(first, first + ROWS_A_STATEMENT)
      .map((row) => `(${leading}, ${intervalCellsText(row)})`);
    await insertRows(conn, {
      head: `INSERT INTO interval_levels (station_id, import_id, ${INTERVAL_COLUMNS})`,
      rows,
    });
  }
}
