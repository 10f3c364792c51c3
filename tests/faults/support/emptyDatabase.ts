import { randomBytes } from 'node:crypto';
import mysql from 'mysql2/promise';
import { afterEach, beforeEach } from 'vitest';
import { closeDb } from '#db/client';

/** Gives each test of a file an empty database, which `db()` and child processes with our environment use. */
export function useEmptyDatabase(): void {
  // Settings are read once.
  const name = `bittern_fault_${randomBytes(6).toString('hex')}`;

  beforeEach(async () => {
    process.env['BITTERN_DB_NAME'] = name;
    await asOwner(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
  });

  afterEach(async () => {
    await closeDb();
    await asOwner(`DROP DATABASE IF EXISTS ${name}`);
  });
}

/** Runs a statement on the tests' server, in no database. */
export async function asOwner(statement: string): Promise<void> {
  const connection = await mysql.createConnection({
    host: process.env['BITTERN_DB_HOST'] ?? '127.0.0.1',
    port: Number(process.env['BITTERN_DB_PORT']),
    user: process.env['BITTERN_DB_USER'],
    password: process.env['BITTERN_DB_PASSWORD'],
  });
  await connection.query(statement);
  await connection.end();
}
