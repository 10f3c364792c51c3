import type { Knex } from 'knex';
import { config } from '#lib/config/index';
import { db } from '../client';
import { connectTo, dataServers, linkName, onEach, type DataServer } from './dataServers';
import { BUCKETS, bucketTable, KINDS, type Kind } from './kinds';
import { linkServers } from './linkServers';
import { relinkAltered } from './relink';
import { bucketTableText, isLinkTable, linkTableText } from './texts';

/**
 * Has the high-volume tables on the data servers, where the settings name some; those that are local are taken there with what they hold.
 * Belongs after migrations and under their lock. Nobody may write meanwhile. Broken off, it is gone on with by calling it again.
 */
export async function shardTables(): Promise<void> {
  const servers = dataServers();
  if (servers.length === 0) return;
  const conn = db();
  const local: [Kind, string][] = [];
  const links = new Map<Kind, string>();
  for (const kind of KINDS) {
    const created = await definitionOf(conn, kind);
    if (isLinkTable(created)) links.set(kind, created);
    else local.push([kind, created]);
  }
  await linkServers(conn, servers);
  await relinkAltered(conn, links);
  if (local.length === 0) return;
  await makeDatabases(servers);
  await onEach(servers, async (connection, server) => {
    const own = bucketsAtFirst(servers.length).flatMap((at, bucket) =>
      servers[at] === server ? [bucket] : [],
    );
    for (const [kind, created] of local) {
      const statements = own.flatMap((bucket) => [
        `DROP TABLE IF EXISTS ${bucketTable(kind, bucket)}`,
        bucketTableText(created, kind, bucket),
      ]);
      await connection.query(statements.join(';\n'));
    }
  });
  for (const [kind, created] of local) await replaceByLinks(conn, kind, created, servers);
}

/** The definition of a table, in the words of `SHOW CREATE TABLE`. */
export async function definitionOf(conn: Knex, table: string): Promise<string> {
  const [[row]] = (await conn.raw('SHOW CREATE TABLE ??', [table])) as [Record<string, string>[]];
  return row?.['Create Table'] ?? '';
}

/** Buckets go round the servers; later they are moved one by one. */
function bucketsAtFirst(serverCount: number): number[] {
  return Array.from({ length: BUCKETS }, (_, bucket) => bucket % serverCount);
}

async function makeDatabases(servers: readonly DataServer[]): Promise<void> {
  for (const server of servers) {
    const connection = await connectTo(server, { isDatabaseThere: false });
    try {
      await connection.query(
        `CREATE DATABASE IF NOT EXISTS \`${config().database.name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`,
      );
    } finally {
      await connection.end();
    }
  }
}

/** The bucket tables of the kind are empty; the local one goes once they have all that it holds. */
async function replaceByLinks(
  conn: Knex,
  kind: Kind,
  created: string,
  servers: readonly DataServer[],
): Promise<void> {
  const [linked, left] = [`${kind}__linked`, `${kind}__local`];
  const places = bucketsAtFirst(servers.length);
  await conn.raw('DROP TABLE IF EXISTS ??', [linked]);
  await conn.raw(
    linkTableText(
      created,
      kind,
      linked,
      (bucket) => linkName(servers[places[bucket] ?? 0] as DataServer),
      config().database.dataTlsCaFile,
    ).replaceAll('?', '\\?'),
  );
  const stationIds: number[] = await conn(kind).distinct().pluck('station_id');
  for (const id of stationIds)
    await conn.raw('INSERT INTO ?? SELECT * FROM ?? WHERE station_id = ?', [linked, kind, id]);
  await conn.raw('RENAME TABLE ?? TO ??, ?? TO ??', [kind, left, linked, kind]);
  await conn.raw('DROP TABLE ??', [left]);
}
