import mysql from 'mysql2/promise';
import { INTERVAL_COLUMNS, intervalCellsText } from '#db/queries/intervalRows';
import type { NewInterval } from '#db/queries/intervals';
import { connectionSettings } from '#db/settings';

/** Inserting packed rows and nothing else: mysql2 alone, each statement a commit of its own. */
export class RawInsert {
  private constructor(private readonly connections: mysql.Connection[]) {}

  static async open(connectionCount: number): Promise<RawInsert> {
    const { connection } = connectionSettings();
    return new RawInsert(
      await Promise.all(
        Array.from({ length: connectionCount }, () =>
          mysql.createConnection(connection as mysql.ConnectionOptions),
        ),
      ),
    );
  }

  /** Runs each connection's statements one after the other, all connections at once. */
  async run(statements: string[][]): Promise<void> {
    await Promise.all(
      this.connections.map(async (connection, at) => {
        for (const statement of statements[at] ?? []) await connection.query(statement);
      }),
    );
  }

  async close(): Promise<void> {
    await Promise.all(this.connections.map((connection) => connection.end()));
  }
}

/** The statement that inserts intervals of a station, made beforehand: its making does not count. */
export function insertStatement(stationId: number, intervals: readonly NewInterval[]): string {
  const rows = intervals.map((row) => `(${stationId}, NULL, ${intervalCellsText(row)})`);
  return `INSERT INTO interval_levels (station_id, import_id, ${INTERVAL_COLUMNS}) VALUES ${rows.join(', ')}`;
}
