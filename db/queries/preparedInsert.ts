import { type Connection } from './connection';

export type Cell = string | number | Buffer | null;

/** Rows to insert: each has one cell a column, in their order. */
export interface PreparedRows {
  table: string;
  columns: readonly string[];
  rows: readonly (readonly Cell[])[];
  /** What follows the values. */
  tail?: string;
}

/** What the driver's connections are used for here. */
interface DriverConnection {
  execute(statement: string, cells: readonly Cell[], done: (error: Error | null) => void): void;
}

interface DriverClient {
  acquireConnection(): Promise<DriverConnection>;
  releaseConnection(connection: DriverConnection): Promise<void>;
}

/** Rows a statement, largest first: a date's quarter-hours, its periods. Each is prepared once a connection, so there must be few. */
const ROWS_A_STATEMENT = [96, 16, 3, 1];

/**
 * Inserts rows by prepared statements, straight through the driver: bytes travel as they are, where text would be twice as long and
 * take the server most of its time to read. The statements go in order and one after another, though none is awaited before the next.
 */
export async function insertPrepared(conn: Connection, insertion: PreparedRows): Promise<void> {
  if (insertion.rows.length === 0) return;
  const client = conn.client as DriverClient;
  const connection = await client.acquireConnection();
  try {
    await Promise.all(
      blocksOf(insertion.rows).map((rows) => execute(connection, statementOf(insertion, rows.length), rows)),
    );
  } finally {
    await client.releaseConnection(connection);
  }
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

function execute(
  connection: DriverConnection,
  statement: string,
  rows: readonly (readonly Cell[])[],
): Promise<void> {
  return new Promise((resolve, reject) => {
    connection.execute(statement, rows.flat(), (error) => (error ? reject(error) : resolve()));
  });
}
