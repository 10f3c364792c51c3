import type { Connection, RowDataPacket } from 'mysql2/promise';
import { bucketTable, KINDS, type Kind } from '#db/sharding/kinds';
import { leftTable } from './moveQueue';

/**
 * Gives a bucket's tables, which this connection holds, other names. Whoever still follows the old links, on a node of the head that is a little
 * behind or in a transaction that waited, finds no table, and writes nothing that would be lost.
 */
export async function putOutOfReach(source: Connection, bucket: number): Promise<void> {
  for (const kind of KINDS)
    await source.query(`ALTER TABLE ${bucketTable(kind, bucket)} RENAME TO ${leftTable(kind, bucket)}`);
}

/** Whether a move was broken off when all of the bucket's tables were out of reach, all having been copied. */
export async function isOutOfReach(source: Connection, bucket: number): Promise<boolean> {
  return (await outOfReach(source, bucket)).length === KINDS.length;
}

/** Gives the tables that were put out of reach their names again. The head must still lead here. */
export async function bringBack(source: Connection, bucket: number): Promise<void> {
  for (const kind of await outOfReach(source, bucket))
    await source.query(`ALTER TABLE ${leftTable(kind, bucket)} RENAME TO ${bucketTable(kind, bucket)}`);
}

async function outOfReach(source: Connection, bucket: number): Promise<Kind[]> {
  const [rows] = await source.query<RowDataPacket[]>(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name IN (?)',
    [KINDS.map((kind) => leftTable(kind, bucket))],
  );
  return KINDS.filter((kind) => rows.some(({ name }) => name === leftTable(kind, bucket)));
}
