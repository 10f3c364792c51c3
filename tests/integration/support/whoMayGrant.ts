import mysql, { type Connection } from 'mysql2/promise';
import { config } from '#lib/config/index';

/** The tests' own account, where it may give rights; else root of the server that the tests started. The caller ends it. */
export async function whoMayGrant(): Promise<Connection> {
  const { host, port, user, password } = config().database;
  const own = await mysql.createConnection({ host, port, user, password });
  const [grants] = await own.query('SHOW GRANTS');
  if (JSON.stringify(grants).includes('WITH GRANT OPTION')) return own;
  const [rows] = await own.query('SELECT @@socket AS socket');
  await own.end();
  const [{ socket }] = rows as [{ socket: string }];
  return mysql.createConnection({ socketPath: socket, user: 'root', password });
}
