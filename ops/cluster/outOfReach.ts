import type { Connection, RowDataPacket } from 'mysql2/promise';
import { bucketTable, KINDS } from '#db/sharding/kinds';
import { leftTable } from './moveQueue';

/**
 * Gives a bucket's tables, which this connection holds, other names. Whoever still follows the old links, on a node of the head that is a little
 * behind or in a transaction that waited, finds no table, and writes nothing that would be lost.
 */
export async function putOutOfReach(source: Connection, bucket: number): Promise<void> {
  for (const kind of KINDS)
    await source.query(`ALTER TABLE ${bucketTable(kind, bucket)} RENAME TO ${leftTable(kind, bucket)}`);
}

/** Whether a move was broken off when all of the bucket's tables were out of reach; where only some were, they come back. */
export async function isOutOfReach(source: Connection, bucket: number): Promise<boolean> {
  const [rows] = await source.query<RowDataPacket[]>(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = DATABASE() AND table_name IN (?)',
    [KINDS.map((kind) => leftTable(kind, bucket))],
  );
  if (rows.length === KINDS.length) return true;
  for (const kind of KINDS.filter((one) => rows.some(({ name }) => name === leftTable(one, bucket))))
    await source.query(`ALTER TABLE ${leftTable(kind, bucket)} RENAME TO ${bucketTable(kind, bucket)}`);
  return false;
}
