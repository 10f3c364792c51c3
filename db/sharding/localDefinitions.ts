import type { RowDataPacket } from 'mysql2/promise';
import { db } from '../client';
import { dataServers, linkName, onEach } from './dataServers';
import { KINDS, bucketTable, type Kind } from './kinds';
import { definitionOf } from './shardTables';
import { localTableText, serversOfLinkTable } from './texts';

/** For each kind that is on data servers, the statement that makes one table with all its rows instead; none where they are local. */
export async function localDefinitions(): Promise<Map<Kind, string>> {
  const definitions = new Map<Kind, string>();
  for (const kind of dataServers().length === 0 ? [] : KINDS) {
    const [link] = serversOfLinkTable(await definitionOf(db(), kind));
    const [created] = await onEach(
      dataServers().filter((server) => linkName(server) === link),
      async (connection) => {
        const [[row]] = await connection.query<RowDataPacket[]>(`SHOW CREATE TABLE ${bucketTable(kind, 0)}`);
        return String(row?.['Create Table']);
      },
    );
    if (created !== undefined) definitions.set(kind, localTableText(created, kind));
  }
  return definitions;
}
