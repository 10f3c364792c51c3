import type { Knex } from 'knex';
import { config } from '#lib/config/index';
import { tlsOf } from './tls';

/**
 * Knex settings for MariaDB: UTC both ways, strict mode (a value out of range is an error, never clamped), affected
 * rows counted as changed rows.
 */
export function connectionSettings(): Knex.Config {
  const { database } = config();
  return {
    client: 'mysql2',
    connection: {
      host: database.host,
      port: database.port,
      user: database.user,
      password: database.password,
      database: database.name,
      charset: 'utf8mb4',
      timezone: 'Z',
      supportBigNumbers: true,
      connectTimeout: 5_000,
      flags: ['-FOUND_ROWS'],
      ...tlsOf(database),
    },
    pool: { min: 0, max: database.poolMax, afterCreate: setSessionModes },
    acquireConnectionTimeout: 5_000,
    migrations: { directory: 'db/migrations', loadExtensions: ['.mjs'], tableName: 'schema_migrations' },
  };
}

/** The same for the replica that heavy reads go to; null where there is none. One that does not answer soon is done without. */
export function replicaSettings(): Knex.Config | null {
  const { replica } = config().database;
  if (!replica) return null;
  const settings = connectionSettings();
  const { host, port } = replica;
  const tls = tlsOf({ host, tlsCaFile: config().database.tlsCaFile });
  return {
    ...settings,
    connection: { ...(settings.connection as object), host, port, connectTimeout: 2_000, ...tls },
    acquireConnectionTimeout: 2_000,
  };
}

interface RawConnection {
  query(sql: string, done: (error: Error | null) => void): void;
}

function setSessionModes(
  connection: RawConnection,
  done: (error: Error | null, connection: RawConnection) => void,
) {
  connection.query(SESSION_MODES, (error) => done(error, connection));
}

/** What every connection begins with. */
export const SESSION_MODES = `SET SESSION sql_mode = 'STRICT_ALL_TABLES,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION,ONLY_FULL_GROUP_BY',
  innodb_lock_wait_timeout = 10, time_zone = '+00:00'`;
