import mysql, { type Connection, type ConnectionOptions, type RowDataPacket } from 'mysql2/promise';
import { connectionSettings } from './settings';

let opening: Promise<Connection> | undefined;

/**
 * Asks the one connection that holds all named locks of this process, apart from the pool: a lock that is held for as long as a job works
 * would otherwise keep a connection from those who have something to ask.
 * @returns the first value of the first row.
 */
export async function askLocks(sql: string, values: readonly string[]): Promise<unknown> {
  opening ??= open();
  const connection = await opening.catch((error: unknown) => {
    opening = undefined;
    throw error;
  });
  try {
    const [rows] = await connection.query<RowDataPacket[]>({ sql, rowsAsArray: true, values: [...values] });
    return (rows[0] as unknown[] | undefined)?.[0];
  } catch (error) {
    // Lost while it was asked, which it tells nobody else: the next question opens another.
    opening = undefined;
    connection.destroy();
    throw error;
  }
}

/** Ends it, where there is one; the locks go with it. */
export async function closeLocks(): Promise<void> {
  const closing = opening;
  opening = undefined;
  await closing?.then((connection) => connection.end()).catch(() => undefined);
}

async function open(): Promise<Connection> {
  const made = await mysql.createConnection(connectionSettings().connection as ConnectionOptions);
  const forget = () => {
    opening = undefined;
  };
  // Lost with the server: the next question opens another.
  made.on('error', forget);
  made.on('end', forget);
  return made;
}
