import type { Knex } from 'knex';
import type { RowDataPacket } from 'mysql2/promise';
import { dataServers, linkName, onEach } from './dataServers';
import { bucketTable, KINDS, type Kind } from './kinds';
import { linkTableText, serversOfLinkTable } from './texts';

/** Columns and keys of a definition, without what follows them. */
const insideOf = (created: string) => created.slice(created.indexOf('('), created.lastIndexOf(') ENGINE'));

/**
 * Makes the head's links of kinds anew, all at once: nobody sees some of them as they were.
 * @param changed kinds, each with a definition that has its columns and keys, and the server of each bucket as the head knows it.
 */
export async function replaceLinks(
  conn: Knex,
  changed: readonly { kind: Kind; created: string; serverOf: (bucket: number) => string }[],
): Promise<void> {
  if (changed.length === 0) return;
  for (const { kind, created, serverOf } of changed) {
    await conn.raw('DROP TABLE IF EXISTS ??, ??', [`${kind}__linked`, `${kind}__left`]);
    const text = linkTableText(created, kind, `${kind}__linked`, serverOf);
    await conn.raw(text.replaceAll('?', '\\?'));
  }
  const renames = changed.map(({ kind }) => `${kind} TO ${kind}__left, ${kind}__linked TO ${kind}`);
  await conn.raw(`RENAME TABLE ${renames.join(', ')}`);
  await conn.raw(`DROP TABLE ${changed.map(({ kind }) => `${kind}__left`).join(', ')}`);
}

/** Has the head's links follow bucket tables that a migration has altered (`alterKind.mjs`). `links`: the head's definitions of all kinds. */
export async function relinkAltered(conn: Knex, links: ReadonlyMap<Kind, string>): Promise<void> {
  const changed = [];
  for (const kind of KINDS) {
    const link = links.get(kind) ?? '';
    const servers = serversOfLinkTable(link);
    const [first] = dataServers().filter((server) => linkName(server) === servers[0]);
    if (!first) continue;
    const [created = ''] = await onEach([first], async (connection) => {
      const [[row]] = await connection.query<RowDataPacket[]>(`SHOW CREATE TABLE ${bucketTable(kind, 0)}`);
      return String(row?.['Create Table']);
    });
    if (insideOf(created) !== insideOf(link))
      changed.push({ kind, created, serverOf: (bucket: number) => servers[bucket] ?? '' });
  }
  await replaceLinks(conn, changed);
}
