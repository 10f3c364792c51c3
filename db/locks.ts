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
  const mine = opening;
  try {
    const connection = await mine;
    const [rows] = await connection.query<RowDataPacket[]>({ sql, rowsAsArray: true, values: [...values] });
    return (rows[0] as unknown[] | undefined)?.[0];
  } catch (error) {
    // Lost, perhaps while it was asked, which it tells nobody else: the next question opens another.
    forget(mine);
    throw error;
  }
}

/** Ends it, where there is one; the locks go with it. */
export async function closeLocks(): Promise<void> {
  const closing = opening;
  opening = undefined;
  await closing?.then((connection) => connection.end()).catch(() => undefined);
}

function open(): Promise<Connection> {
  const made = mysql.createConnection(connectionSettings().connection as ConnectionOptions);
  made.then(
    (connection) => {
      connection.on('error', () => forget(made));
      connection.on('end', () => forget(made));
    },
    () => undefined,
  );
  return made;
}

/**
 * Another one may be open by the time that this one is found lost, and holds locks: it stays. Ended rather than destroyed, which would leave
 * whoever still asks it without an answer for good.
 */
function forget(lost: Promise<Connection>): void {
  if (opening === lost) opening = undefined;
  lost.then((connection) => connection.end()).catch(() => undefined);
}
