import { execFile } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import mysql, { type RowDataPacket } from 'mysql2/promise';
import { tlsOf } from '#db/tls';

/** How a command ended, and what it said. */
export interface Ended {
  code: number;
  said: string;
}

/** Runs a script of `ops/` with settings added to ours. */
export function runScript(
  script: string,
  args: string[],
  environment: Record<string, string>,
): Promise<Ended> {
  return new Promise((done) => {
    execFile(
      'bash',
      [script, ...args],
      { env: { ...process.env, BITTERN_DB_OWN: 'false', ...environment } },
      (error, stdout, stderr) =>
        done({ code: error === null ? 0 : Number(error.code), said: `${stdout}${stderr}` }),
    );
  });
}

/** A name for a database that a test makes and drops itself. */
export function freshName(): string {
  return `bittern_test_${randomBytes(6).toString('hex')}`;
}

/** Asks the server itself, past Bittern's own connections. */
export async function askServer(sql: string, database?: string): Promise<RowDataPacket[]> {
  const host = process.env['BITTERN_DB_HOST'] ?? '127.0.0.1';
  const connection = await mysql.createConnection({
    host,
    port: Number(process.env['BITTERN_DB_PORT']),
    user: process.env['BITTERN_DB_USER'],
    password: process.env['BITTERN_DB_PASSWORD'],
    timezone: 'Z',
    database,
    ...tlsOf({ host, tlsCaFile: process.env['BITTERN_DB_TLS_CA'] ?? null }),
  });
  try {
    const [rows] = await connection.query<RowDataPacket[]>(sql);
    return rows;
  } finally {
    await connection.end();
  }
}

/** Rows and SHA-256 of every table, read by queries and not by the way that backups are made. */
export async function tablesOf(database: string): Promise<Record<string, string>> {
  const found: Record<string, string> = {};
  const tables = await askServer(
    `SELECT table_name AS name FROM information_schema.tables WHERE table_schema = '${database}' ORDER BY 1`,
  );
  for (const { name } of tables) {
    const rows = await askServer(`SELECT * FROM \`${name}\``, database);
    const lines = rows.map((row) => JSON.stringify(row)).sort();
    const digest = createHash('sha256').update(lines.join('\n')).digest('hex');
    found[String(name)] = `${rows.length} ${digest}`;
  }
  return found;
}

/** Triggers of a database, by what they do. */
export async function triggersOf(database: string): Promise<string[]> {
  const rows = await askServer(
    `SELECT CONCAT(trigger_name, ' ', action_statement) AS text FROM information_schema.triggers
     WHERE trigger_schema = '${database}' ORDER BY 1`,
  );
  return rows.map(({ text }) => String(text));
}
