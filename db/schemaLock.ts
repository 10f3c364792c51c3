import mysql, { type ConnectionOptions, type RowDataPacket } from 'mysql2/promise';
import { config } from '#lib/config/index';
import { connectionSettings } from './settings';

const LONGEST_WAIT_SEC = 3600;

/** Runs `work` while no other process changes the schema; whoever comes second waits. The lock goes with the process that has it. */
export async function withSchemaLock<T>(work: () => Promise<T>): Promise<T> {
  const connection = await mysql.createConnection(connectionSettings().connection as ConnectionOptions);
  // Lost with the server: the work meets that itself.
  connection.on('error', () => undefined);
  try {
    const name = `bittern-schema:${config().database.name}`.slice(0, 64);
    const [rows] = await connection.query<RowDataPacket[]>('SELECT GET_LOCK(?, ?) AS held', [
      name,
      LONGEST_WAIT_SEC,
    ]);
    if (Number(rows[0]?.['held']) !== 1)
      throw new Error('Another process has been changing the schema for an hour.');
    return await work();
  } finally {
    connection.destroy();
  }
}
