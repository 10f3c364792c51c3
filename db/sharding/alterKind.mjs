import { readFileSync } from 'node:fs';
import { isIP } from 'node:net';
import mysql from 'mysql2/promise';

/** What a statement says that has been carried out already: a migration that was broken off is gone on with. */
const ALREADY_DONE = new Set([1060, 1061, 1091]);

/**
 * For migrations: alters a high-volume table wherever it stands, local or each bucket's table on the data servers. The head's links follow
 * when all migrations are applied (`relink.ts`): a migration of the same run sees the table as it was.
 * `change`: what follows ALTER TABLE and the name.
 */
export async function alterKind(knex, kind, change) {
  const [[row]] = await knex.raw('SHOW CREATE TABLE ??', [kind]);
  const created = row['Create Table'];
  if (!/ENGINE ?= ?SPIDER/i.test(created)) {
    await knex.raw(`ALTER TABLE ${kind} ${change}`);
    return;
  }
  const places = [...created.matchAll(/srv "([^"]+)", tbl "(\w+)"/g)];
  const ca = /ssl_ca "([^"]+)"/.exec(created)?.[1];
  for (const server of new Set(places.map(([, name]) => name))) {
    const [[known]] = await knex.raw('SELECT * FROM mysql.servers WHERE Server_name = ?', [server]);
    const connection = await mysql.createConnection({
      host: known.Host,
      port: known.Port,
      user: known.Username,
      password: known.Password,
      database: known.Db,
      ...(ca ? { ssl: { ca: readFileSync(ca), verifyIdentity: isIP(known.Host) === 0 } } : {}),
    });
    try {
      for (const [, name, table] of places) if (name === server) await alter(connection, table, change);
    } finally {
      await connection.end();
    }
  }
}

async function alter(connection, table, change) {
  try {
    await connection.query(`ALTER TABLE ${table} ${change}`);
  } catch (error) {
    if (!ALREADY_DONE.has(error.errno)) throw error;
  }
}
