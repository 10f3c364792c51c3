import knex, { type Knex } from 'knex';
import { closeReceiving } from './receiving';
import { connectionSettings } from './settings';

let pool: Knex | undefined;

/** The connection pool of everything but receiving; made at the first call. */
export function db(): Knex {
  pool ??= knex(connectionSettings());
  return pool;
}

/** Ends every connection, so that the process can stop. */
export async function closeDb(): Promise<void> {
  const closing = pool;
  pool = undefined;
  await Promise.all([closing?.destroy(), closeReceiving()]);
}
