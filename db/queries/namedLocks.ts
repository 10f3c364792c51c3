import { db } from '../client';

/**
 * Runs `work` while holding a named lock of this database, or answers null at once when somebody else holds it. It saves work
 * and nothing more: the lock is lost with its connection, so whatever it guards must be right without it.
 */
export async function tryNamedLock<T>(name: string, work: () => Promise<T>): Promise<T | null> {
  // A transaction only keeps one connection for the lock; nothing is read or written in it.
  return db().transaction(async (holder) => {
    const [rows] = await holder.raw(`SELECT GET_LOCK(CONCAT(DATABASE(), '.', ?), 0) AS granted`, [name]);
    if (rows[0]?.granted !== 1) return null;
    try {
      return await work();
    } finally {
      await holder.raw(`DO RELEASE_LOCK(CONCAT(DATABASE(), '.', ?))`, [name]);
    }
  });
}
