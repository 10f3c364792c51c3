import { config } from '#lib/config/index';
import { db } from '../client';
import { dataServers, linkName, onEach } from './dataServers';

/** Drops everything of our database on the data servers, and what the head knows of them, before the head's own database is dropped. */
export async function dropShards(): Promise<void> {
  const { name } = config().database;
  await onEach(dataServers(), (connection) => connection.query(`DROP DATABASE IF EXISTS \`${name}\``));
  for (const server of dataServers()) await db().raw(`DROP SERVER IF EXISTS \`${linkName(server)}\``);
}
