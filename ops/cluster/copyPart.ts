import { createHash } from 'node:crypto';
import type { Connection, RowDataPacket } from 'mysql2/promise';
import { bucketTable, type Kind } from '#db/sharding/kinds';
import { partText, type Part } from './moveQueue';

const ROWS_A_STATEMENT = 500;

/** The order that rows of a part are compared in. */
const KEY: Record<Kind, string> = {
  interval_levels: 'station_id, starts_at',
  dirty_marks: 'station_id, id',
  station_latest: 'station_id',
  quarter_hours: 'station_id, starts_at',
  day_periods: 'station_id, local_date, period',
  station_day_traces: 'station_id, starts_at',
  clock_shift_starts: 'station_id, starts_at',
  station_locks: 'station_id',
};

/**
 * Makes the rows of a part at the target what they are at the source, and reads both again to be sure.
 * @returns whether they are the same; they are not where the source changed meanwhile, which has it copied once more.
 */
export async function copyPart(
  source: Connection,
  target: Connection,
  bucket: number,
  part: Part,
): Promise<boolean> {
  const table = bucketTable(part.kind, bucket);
  const rows = await rowsOf(source, table, part);
  await target.beginTransaction();
  try {
    await target.query(`DELETE FROM ${table} WHERE ${partText(part)}`);
    for (let from = 0; from < rows.length; from += ROWS_A_STATEMENT) {
      const some = rows.slice(from, from + ROWS_A_STATEMENT);
      const columns = Object.keys(some[0] ?? {});
      await target.query(`INSERT INTO ${table} (${columns.join(', ')}) VALUES ?`, [
        some.map((row) => columns.map((column) => row[column] as unknown)),
      ]);
    }
    await target.commit();
  } catch (error) {
    await target.rollback();
    throw error;
  }
  return digestOf(await rowsOf(source, table, part)) === digestOf(await rowsOf(target, table, part));
}

async function rowsOf(connection: Connection, table: string, part: Part): Promise<RowDataPacket[]> {
  const [rows] = await connection.query<RowDataPacket[]>({
    sql: `SELECT * FROM ${table} WHERE ${partText(part)} ORDER BY ${KEY[part.kind]}`,
    dateStrings: true,
  });
  return rows;
}

function digestOf(rows: readonly RowDataPacket[]): string {
  const digest = createHash('sha256');
  for (const row of rows) digest.update(JSON.stringify(Object.values(row)));
  return digest.digest('hex');
}
