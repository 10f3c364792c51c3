import mysql, { type Connection, type ConnectionOptions } from 'mysql2/promise';
import { connectionSettings } from '../settings';
import { dataServers } from './dataServers';

/**
 * Where links change while a transaction commits, the head undoes what it wrote on data servers, does its own part again, and reports success (Galera
 * replays a write-set, in which rows of data servers are not). So whoever writes holds the gate, and whoever changes links closes it.
 */
const ENTER = 'SELECT id FROM link_gate WHERE id = 1 LOCK IN SHARE MODE';
const CLOSE = 'SELECT id FROM link_gate WHERE id = 1 FOR UPDATE';

/** Whoever comes meanwhile waits behind us: not for long at a time. */
const WAIT_SEC = 3;
const PAUSE_MS = 1_000;
const MOST_ATTEMPTS = 100;
const LOCK_WAIT_TIMEOUT = 1205;

/** The statements that a transaction which writes begins with: none where all tables are ours. */
export function enterGate(): string[] {
  return dataServers().length > 0 ? [ENTER] : [];
}

/** Runs `work` while no transaction writes; those that are to begin wait for it. @throws where one that writes does not end. */
export async function withGateClosed<T>(work: () => Promise<T>): Promise<T> {
  const connection = await mysql.createConnection(connectionSettings().connection as ConnectionOptions);
  // Lost with the server: the work meets that itself.
  connection.on('error', () => undefined);
  try {
    await close(connection);
    return await work();
  } finally {
    connection.destroy();
  }
}

async function close(connection: Connection): Promise<void> {
  await connection.query(`SET SESSION innodb_lock_wait_timeout = ${WAIT_SEC}`);
  for (let attempt = 1; ; attempt += 1) {
    try {
      await connection.query('START TRANSACTION');
      await connection.query(CLOSE);
      return;
    } catch (error) {
      if ((error as { errno?: number }).errno !== LOCK_WAIT_TIMEOUT || attempt === MOST_ATTEMPTS) throw error;
      await connection.query('ROLLBACK');
      await new Promise((resolve) => setTimeout(resolve, PAUSE_MS));
    }
  }
}
