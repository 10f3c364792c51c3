import mysql, { type Connection, type RowDataPacket } from 'mysql2/promise';
import { tlsOf } from '#db/tls';
import type { Config } from '#lib/config/config';
import { Ending, EXIT } from './ending';

/** A connection that asks about the server and the database as they are. The caller ends it. */
export function connect({ database }: Config): Promise<Connection> {
  const { host, port, user, password, name } = database;
  return mysql.createConnection({ host, port, user, password, database: name, ...tlsOf(database) });
}

/** The first value of the first row of a statement's result. */
export async function valueOf(connection: Connection, sql: string, values: unknown[] = []): Promise<unknown> {
  const [rows] = await connection.query<RowDataPacket[]>({ sql, rowsAsArray: true, values });
  return (rows[0] as unknown[] | undefined)?.[0];
}

/**
 * Takes the turn to back up or restore this database, for as long as the connection lasts.
 * @throws {Ending} when another has it.
 */
export async function takeTurn(connection: Connection, name: string): Promise<void> {
  if (Number(await valueOf(connection, 'SELECT GET_LOCK(?, 0)', [`bittern-backup ${name}`])) === 1) return;
  throw new Ending(EXIT.busy, 'Another backup or restore of this database is running.');
}

/** Names of the database's tables. */
export async function tableNames(connection: Connection): Promise<string[]> {
  const [rows] = await connection.query<RowDataPacket[]>(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() ORDER BY table_name',
  );
  return rows.map(({ name }) => String(name));
}
