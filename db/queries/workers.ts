import { pool, type Connection } from './connection';

/** A worker that was not seen for longer is taken for dead, by the clock of the database. */
export const WORKER_DEAD_AFTER_SEC = 30;

/** A worker process as it told of itself. */
export interface WorkerRow {
  id: string;
  /** Machine and process number. */
  name: string;
  startedAtSec: number;
  seenAtSec: number;
  isLiving: boolean;
  /** Of stations that it computes. */
  buckets: number[];
}

// One that was seen by a clock far ahead would never die.
const IS_LIVING = `seen_at > UNIX_TIMESTAMP() - ${WORKER_DEAD_AFTER_SEC} AND seen_at <= UNIX_TIMESTAMP() + ${WORKER_DEAD_AFTER_SEC}`;

/** Says that a worker lives. @returns the ids of all that do. */
export async function seeWorker(id: string, name: string, conn: Connection = pool()): Promise<string[]> {
  await conn.raw(
    `INSERT INTO workers (id, name, started_at, seen_at) VALUES (?, ?, UNIX_TIMESTAMP(), UNIX_TIMESTAMP())
     ON DUPLICATE KEY UPDATE seen_at = UNIX_TIMESTAMP()`,
    [id, name],
  );
  return conn('workers').whereRaw(IS_LIVING).orderBy('id').pluck('id');
}

/** Notes which buckets a worker has taken. */
export async function noteBuckets(
  id: string,
  buckets: readonly number[],
  conn: Connection = pool(),
): Promise<void> {
  await conn('workers')
    .where({ id })
    .update({ buckets: buckets.join(',') });
}

/** A worker ends: others may have its buckets at once. */
export async function removeWorker(id: string, conn: Connection = pool()): Promise<void> {
  await conn('workers').where({ id }).delete();
}

/** Workers that live, and those that were not told to end and have not been seen since, longest at work first. */
export async function listWorkers(conn: Connection = pool()): Promise<WorkerRow[]> {
  const rows: (Omit<WorkerRow, 'isLiving' | 'buckets'> & { isLiving: number; buckets: string })[] =
    await conn('workers')
      .orderBy(['started_at', 'id'])
      .select({
        id: 'id',
        name: 'name',
        startedAtSec: 'started_at',
        seenAtSec: 'seen_at',
        buckets: 'buckets',
      })
      .select(conn.raw(`${IS_LIVING} AS isLiving`));
  return rows.map((row) => ({
    ...row,
    isLiving: row.isLiving === 1,
    buckets: row.buckets === '' ? [] : row.buckets.split(',').map(Number),
  }));
}

/** Forgets workers that were not seen for a day. @returns how many. */
export async function deleteDeadWorkers(conn: Connection = pool()): Promise<number> {
  return conn('workers').whereRaw('seen_at < UNIX_TIMESTAMP() - 86400').delete();
}
