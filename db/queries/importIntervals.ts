import { pool, type Connection } from './connection';
import { LONGEST_INTERVAL_SEC, type NewInterval, type StoredInterval } from './intervals';
import { INTERVAL_COLUMNS, intervalCellsText, intervalsOfCells, type IntervalCells } from './intervalRows';

const ROWS_A_STATEMENT = 600;

/** Puts intervals aside for an import: they are not stored yet. */
export async function insertStaged(
  importId: number,
  intervals: readonly NewInterval[],
  transaction: Connection,
): Promise<void> {
  for (let first = 0; first < intervals.length; first += ROWS_A_STATEMENT) {
    const rows = intervals
      .slice(first, first + ROWS_A_STATEMENT)
      .map((row) => `(${importId}, ${intervalCellsText(row)})`);
    await transaction.raw(
      `INSERT INTO import_intervals (import_id, ${INTERVAL_COLUMNS}) VALUES ${rows.join(', ')}`,
    );
  }
}

/** As `selectIntervals`, of those put aside for an import. */
export async function selectStaged(
  importId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<StoredInterval[]> {
  const [rows] = await conn
    .raw(
      `SELECT ${INTERVAL_COLUMNS} FROM import_intervals
       WHERE import_id = ? AND starts_at > ? AND starts_at < ? AND starts_at + duration_sec > ?
       ORDER BY starts_at`,
      [importId, fromSec - LONGEST_INTERVAL_SEC, toSec, fromSec],
    )
    .options({ rowsAsArray: true });
  return intervalsOfCells(rows as IntervalCells[], conn);
}

/** The first intervals put aside for an import that begin after `afterSec`, ascending. */
export async function nextStaged(
  importId: number,
  afterSec: number,
  limit: number,
  conn: Connection = pool(),
): Promise<StoredInterval[]> {
  const [rows] = await conn
    .raw(
      `SELECT ${INTERVAL_COLUMNS} FROM import_intervals
       WHERE import_id = ? AND starts_at > ? ORDER BY starts_at LIMIT ?`,
      [importId, afterSec, limit],
    )
    .options({ rowsAsArray: true });
  return intervalsOfCells(rows as IntervalCells[], conn);
}

/** Forgets intervals put aside that begin no later than `upToSec`; all of them where it is null. At most `limit`. */
export async function deleteStaged(
  importId: number,
  upToSec: number | null,
  limit: number,
  transaction: Connection,
): Promise<number> {
  const rows = transaction('import_intervals').where({ import_id: importId }).limit(limit);
  if (upToSec !== null) rows.where('starts_at', '<=', upToSec);
  return rows.delete();
}

/** An interval that an import has stored: its stretch, for marks. */
export interface StoredStretch {
  startSec: number;
  durationSec: number;
}

/** The first intervals of a station that an import has stored and that begin after `afterSec`, ascending. */
export async function nextStoredOf(
  importId: number,
  stationId: number,
  afterSec: number,
  limit: number,
  conn: Connection,
): Promise<StoredStretch[]> {
  return conn('interval_levels')
    .where({ station_id: stationId, import_id: importId })
    .where('starts_at', '>', afterSec)
    .orderBy('starts_at')
    .limit(limit)
    .select({ startSec: 'starts_at', durationSec: 'duration_sec' });
}

/** Takes what an import has stored in `fromSec <= start <= toSec` out again, and puts it aside to the byte. */
export async function unstore(
  importId: number,
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  transaction: Connection,
): Promise<void> {
  const where = 'station_id = ? AND import_id = ? AND starts_at BETWEEN ? AND ?';
  const bindings = [stationId, importId, fromSec, toSec];
  await transaction.raw(
    `INSERT INTO import_intervals (import_id, ${INTERVAL_COLUMNS})
     SELECT import_id, ${INTERVAL_COLUMNS} FROM interval_levels WHERE ${where}`,
    bindings,
  );
  await transaction.raw(`DELETE FROM interval_levels WHERE ${where}`, bindings);
}
