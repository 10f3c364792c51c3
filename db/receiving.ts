import mysql from 'mysql2';
import { connectionSettings, SESSION_MODES } from './settings';

let pool: mysql.Pool | undefined;

/** Connections of receiving, apart from the pool that everything else shares: monitors that flood leave people theirs. */
export function receivingPool(): mysql.Pool {
  pool ??= makePool();
  return pool;
}

/** Ends them, where there are any. */
export async function closeReceiving(): Promise<void> {
  const closing = pool;
  pool = undefined;
  await new Promise<void>((closed) => (closing ? closing.end(() => closed()) : closed()));
}

function makePool(): mysql.Pool {
  const { connection } = connectionSettings();
  const made = mysql.createPool({
    ...(connection as mysql.PoolOptions),
    multipleStatements: true,
    // Statements come complete: looking for placeholders in all that is stored would cost more than writing it.
    queryFormat: (sql: string) => sql,
    connectionLimit: RECEIVING_CONNECTIONS,
  });
  // It is queued before whatever the connection is asked first.
  made.on('connection', (fresh) => fresh.query(SESSION_MODES, () => undefined));
  return made;
}

/** As many as there may be posts in their turn. */
const RECEIVING_CONNECTIONS = 6;
