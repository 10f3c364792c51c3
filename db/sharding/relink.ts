import type { Knex } from 'knex';
import type { RowDataPacket } from 'mysql2/promise';
import { config } from '#lib/config/index';
import { dataServers, linkName, onEach } from './dataServers';
import { bucketTable, KINDS, type Kind } from './kinds';
import { withGateClosed } from './linkGate';
import { linkTableText, serversOfLinkTable, tlsCaOfLinkTable } from './texts';

/** Columns and keys of a definition, without what follows them. */
const insideOf = (created: string) => created.slice(created.indexOf('('), created.lastIndexOf(') ENGINE'));

/** A kind, a definition that has its columns and keys, and the server of each bucket as the head knows it. */
export interface ChangedKind {
  kind: Kind;
  created: string;
  serverOf: (bucket: number) => string;
}

/** Makes links of kinds anew beside those that are used, which takes longest. `useLinks` puts them in their place. */
export async function makeLinks(conn: Knex, changed: readonly ChangedKind[]): Promise<void> {
  await dropOldLinks(conn);
  const { dataTlsCaFile } = config().database;
  for (const { kind, created, serverOf } of changed) {
    await conn.raw('DROP TABLE IF EXISTS ??', [`${kind}__linked`]);
    const text = linkTableText(created, kind, `${kind}__linked`, serverOf, dataTlsCaFile);
    await conn.raw(text.replaceAll('?', '\\?'));
  }
}

/** Has the head use links that were made, all at once: nobody sees some of them as they were. */
export async function useLinks(conn: Knex, changed: readonly Pick<ChangedKind, 'kind'>[]): Promise<void> {
  const renames = changed.map(({ kind }) => `${kind} TO ${kind}__left, ${kind}__linked TO ${kind}`);
  await conn.raw(`RENAME TABLE ${renames.join(', ')}`);
}

/** Drops the links that `useLinks` has replaced. */
export async function dropOldLinks(conn: Knex): Promise<void> {
  await conn.raw(`DROP TABLE IF EXISTS ${KINDS.map((kind) => `${kind}__left`).join(', ')}`);
}

/** Has the head's links follow bucket tables that a migration has altered (`alterKind.mjs`), and the setting for TLS. `links`: the head's definitions of all kinds. */
export async function relinkAltered(conn: Knex, links: ReadonlyMap<Kind, string>): Promise<void> {
  const changed: ChangedKind[] = [];
  for (const kind of KINDS) {
    const link = links.get(kind) ?? '';
    const servers = serversOfLinkTable(link);
    const [first] = dataServers().filter((server) => linkName(server) === servers[0]);
    if (!first) continue;
    const [created = ''] = await onEach([first], async (connection) => {
      const [[row]] = await connection.query<RowDataPacket[]>(`SHOW CREATE TABLE ${bucketTable(kind, 0)}`);
      return String(row?.['Create Table']);
    });
    if (insideOf(created) !== insideOf(link) || tlsCaOfLinkTable(link) !== config().database.dataTlsCaFile)
      changed.push({ kind, created, serverOf: (bucket: number) => servers[bucket] ?? '' });
  }
  if (changed.length === 0) return;
  await makeLinks(conn, changed);
  await withGateClosed(() => useLinks(conn, changed));
  await dropOldLinks(conn);
}
