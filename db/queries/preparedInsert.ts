import { type Connection } from './connection';
import { runPrepared, type Cell } from './prepared';

export type { Cell };

/** Rows to insert: each has one cell a column, in their order. */
export interface PreparedRows {
  table: string;
  columns: readonly string[];
  rows: readonly (readonly Cell[])[];
  /** What follows the values. */
  tail?: string;
}

/** Rows a statement, largest first: quarter-hours of three dates, of one; periods of three dates, of one. */
const ROWS_A_STATEMENT = [288, 96, 16, 9, 3, 1];

/** Inserts rows by prepared statements, which go in order. */
export async function insertPrepared(conn: Connection, insertion: PreparedRows): Promise<void> {
  if (insertion.rows.length === 0) return;
  await runPrepared(
    conn,
    blocksOf(insertion.rows).map((rows) => ({
      statement: statementOf(insertion, rows.length),
      cells: rows.flat(),
    })),
  );
}

function blocksOf(rows: readonly (readonly Cell[])[]): (readonly (readonly Cell[])[])[] {
  const blocks: (readonly (readonly Cell[])[])[] = [];
  for (let from = 0; from < rows.length;) {
    const count = ROWS_A_STATEMENT.find((size) => size <= rows.length - from) ?? 1;
    blocks.push(rows.slice(from, from + count));
    from += count;
  }
  return blocks;
}

function statementOf({ table, columns, tail = '' }: PreparedRows, rowCount: number): string {
  const row = `(${columns.map(() => '?').join(', ')})`;
  return `INSERT INTO ${table} (${columns.join(', ')}) VALUES ${Array<string>(rowCount).fill(row).join(', ')} ${tail}`;
}
