import { randomBytes } from 'node:crypto';
import type { Connection } from 'mysql2/promise';

/** Web and worker may add to these and read them, and nothing else. */
export const INSERT_ONLY = ['audit_log', 'issued_summaries', 'issued_summary_files'];
/** One row that names the trail's last act: moved on, never removed. */
const MOVED_ON = ['audit_head'];
/** Partitions of them are made as months come and dropped as they go, by the worker. */
const PARTED = ['interval_levels', 'quarter_hours'];
/** What was migrated is the owner's to say. */
const READ_ONLY = ['schema_migrations', 'schema_migrations_lock'];

/** An account of the database server, by its two parts. */
export interface DatabaseAccount {
  user: string;
  host: string;
}

/**
 * The statements that let an account do in a database what web and worker do, table by table, because MariaDB cannot take a right on one table
 * back from a right on all. They are carried out again after migrations, which may have added tables.
 */
export function appGrants(
  database: string,
  tables: readonly string[],
  { user, host }: DatabaseAccount,
): string[] {
  const account = `${quoted(user)}@${quoted(host)}`;
  return tables.map((table) => `GRANT ${rightsOn(table)} ON \`${database}\`.\`${table}\` TO ${account}`);
}

function rightsOn(table: string): string {
  if (INSERT_ONLY.includes(table)) return 'SELECT, INSERT';
  if (MOVED_ON.includes(table)) return 'SELECT, UPDATE';
  if (READ_ONLY.includes(table)) return 'SELECT';
  if (PARTED.includes(table)) return 'SELECT, INSERT, UPDATE, DELETE, ALTER, DROP';
  return 'SELECT, INSERT, UPDATE, DELETE';
}

function quoted(text: string): string {
  return `'${text.replace(/['\\]/g, '\\$&')}'`;
}

/** A server of our own listens there alone. */
const HOST = '127.0.0.1';

/**
 * Makes the account that web and worker of a server of our own use, anew at each start with a password that is kept nowhere, and
 * without any right that it had before.
 * `root`: a connection that may make accounts.
 */
export async function makeAppAccount(
  root: Connection,
  { owner, database }: { owner: string; database: string },
): Promise<{ user: string; password: string }> {
  const user = `${owner}_app`.slice(0, 80);
  const password = randomBytes(24).toString('base64url');
  await root.query('CREATE OR REPLACE USER ?@? IDENTIFIED BY ?', [user, HOST, password]);
  const [rows] = await root.query(
    "SELECT table_name AS name FROM information_schema.tables WHERE table_schema = ? AND table_type = 'BASE TABLE'",
    [database],
  );
  const tables = (rows as { name: string }[]).map(({ name }) => name);
  for (const statement of appGrants(database, tables, { user, host: HOST })) await root.query(statement);
  return { user, password };
}
