import knex, { type Knex } from 'knex';
import { closeReceiving } from './receiving';
import { connectionSettings, replicaSettings } from './settings';

let pool: Knex | undefined;
let replica: Knex | undefined;

/** The connection pool of everything but receiving; made at the first call. */
export function db(): Knex {
  pool ??= knex(connectionSettings());
  return pool;
}

/** The connection pool of heavy reads, where the settings name a replica for them; made at the first call. */
export function replicaDb(): Knex | null {
  const settings = replicaSettings();
  return settings && (replica ??= knex(settings));
}

/** Ends every connection, so that the process can stop. */
export async function closeDb(): Promise<void> {
  const closing = [pool, replica];
  [pool, replica] = [undefined, undefined];
  await Promise.all([...closing.map((one) => one?.destroy()), closeReceiving()]);
}
