import { type Connection } from './connection';

export type Cell = string | number | Buffer | null;

/** What the driver's connections are used for here. */
interface DriverConnection {
  execute(
    statement: { sql: string; rowsAsArray: true },
    cells: readonly Cell[],
    done: (error: Error | null, rows: unknown) => void,
  ): void;
}

interface DriverClient {
  acquireConnection(): Promise<DriverConnection>;
  releaseConnection(connection: DriverConnection): Promise<void>;
}

/** A statement with a question mark for each of its cells. There must be few of them: each is prepared once a connection, and kept. */
export interface Prepared {
  statement: string;
  cells: readonly Cell[];
}

/**
 * Runs prepared statements on one connection, straight through the driver: numbers and bytes travel as they are, where text takes the
 * server and this process most of their time. They go in order and one after another, though none is awaited before the next.
 * @returns what each gave: of a SELECT its rows, as arrays in the order of its columns.
 */
export async function runPrepared(conn: Connection, all: readonly Prepared[]): Promise<unknown[]> {
  const client = conn.client as DriverClient;
  const connection = await client.acquireConnection();
  try {
    return await Promise.all(all.map((prepared) => execute(connection, prepared)));
  } finally {
    await client.releaseConnection(connection);
  }
}

function execute(connection: DriverConnection, { statement, cells }: Prepared): Promise<unknown> {
  return new Promise((resolve, reject) => {
    connection.execute({ sql: statement, rowsAsArray: true }, cells, (error, rows) =>
      error ? reject(error) : resolve(rows),
    );
  });
}
