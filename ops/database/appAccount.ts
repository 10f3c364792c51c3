import { randomBytes } from 'node:crypto';
import type { Connection } from 'mysql2/promise';
import { appRightsOn } from '#db/appRights';

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
  return tables.map(
    (table) => `GRANT ${appRightsOn(table).join(', ')} ON \`${database}\`.\`${table}\` TO ${account}`,
  );
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
