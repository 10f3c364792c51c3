import mysql from 'mysql2/promise';
import { tlsOf } from '#db/tls';

/** Runs a statement, such as one that makes or drops a database, outside of any database. */
export async function asOwner(statement: string): Promise<void> {
  const host = process.env['BITTERN_DB_HOST'] ?? '127.0.0.1';
  const connection = await mysql.createConnection({
    host,
    port: Number(process.env['BITTERN_DB_PORT']),
    user: process.env['BITTERN_DB_USER'],
    password: process.env['BITTERN_DB_PASSWORD'],
    ...tlsOf({ host, tlsCaFile: process.env['BITTERN_DB_TLS_CA'] ?? null }),
  });
  await connection.query(statement);
  await connection.end();
}
