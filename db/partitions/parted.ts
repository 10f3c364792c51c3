import mysql, { type Connection, type ConnectionOptions, type RowDataPacket } from 'mysql2/promise';
import { connectTo, dataServers } from '../sharding/dataServers';
import { connectionSettings } from '../settings';
import { OPEN, type Partition } from './months';

/** Tables that are parted by months; the intervals' old months can be dropped. */
export type PartedTable = 'interval_levels' | 'quarter_hours';

/** A table that is parted, on one server: the table itself, or one of a bucket of stations. */
export interface Parted {
  kind: PartedTable;
  table: string;
  partitions: Partition[];
}

/** Longest wait for those who work with a table, in seconds; whoever comes meanwhile waits behind us. */
const LONGEST_WAIT_SEC = 5;

/** Does something on each server that has parted tables: ours, or the data servers. */
export async function onPartedServers(work: (connection: Connection) => Promise<void>): Promise<void> {
  const servers = dataServers();
  const opened =
    servers.length > 0
      ? servers.map((server) => () => connectTo(server))
      : [() => mysql.createConnection(connectionSettings().connection as ConnectionOptions)];
  for (const open of opened) {
    const connection = await open();
    try {
      await connection.query(`SET SESSION lock_wait_timeout = ${LONGEST_WAIT_SEC}`);
      await work(connection);
    } finally {
      await connection.end();
    }
  }
}

/** The parted tables of a server with their partitions, oldest first. */
export async function listParted(connection: Connection): Promise<Parted[]> {
  const [rows] = await connection.query<RowDataPacket[]>(
    `SELECT TABLE_NAME AS name, PARTITION_NAME AS part, PARTITION_DESCRIPTION AS ends FROM information_schema.PARTITIONS
     WHERE TABLE_SCHEMA = DATABASE() AND PARTITION_METHOD = 'RANGE'
       AND TABLE_NAME REGEXP '^(interval_levels|quarter_hours)(_[0-9]{2})?$'
     ORDER BY TABLE_NAME, PARTITION_ORDINAL_POSITION`,
  );
  const tables = new Map<string, Parted>();
  for (const { name, part, ends } of rows as { name: string; part: string; ends: string }[]) {
    const kind = name.startsWith('quarter') ? 'quarter_hours' : 'interval_levels';
    const parted = tables.get(name) ?? { kind, table: name, partitions: [] };
    parted.partitions.push({ name: part, endSec: ends === 'MAXVALUE' ? null : Number(ends) });
    tables.set(name, parted);
  }
  return [...tables.values()];
}

/** Splits months off a table's open partition. */
export async function splitOpen(
  connection: Connection,
  { table }: Parted,
  months: readonly Partition[],
): Promise<void> {
  if (months.length === 0) return;
  const parts = months.map(({ name, endSec }) => `PARTITION ${name} VALUES LESS THAN (${endSec})`);
  await connection.query(
    `ALTER TABLE ${table} REORGANIZE PARTITION ${OPEN} INTO (${parts.join(', ')}, PARTITION ${OPEN} VALUES LESS THAN MAXVALUE)`,
  );
}

/** Drops partitions with all that is in them. */
export async function dropPartitions(
  connection: Connection,
  { table }: Parted,
  partitions: readonly Partition[],
): Promise<void> {
  if (partitions.length === 0) return;
  await connection.query(
    `ALTER TABLE ${table} DROP PARTITION ${partitions.map(({ name }) => name).join(', ')}`,
  );
}
