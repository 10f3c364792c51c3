import { config } from '#lib/config/index';
import { db } from '../client';

/**
 * Runs `work` while no other process runs it, or not at all. The lock saves double work; it is not what makes the work correct
 * (it is lost with its connection).
 */
export async function withNamedLock(name: string, work: () => Promise<void>): Promise<boolean> {
  const { client } = db();
  const connection: unknown = await client.acquireConnection();
  const lock = `bittern:${config().database.name}:${name}`.slice(0, 64);
  const ask = async (sql: string) => {
    const [[row]] = await db().raw(sql, [lock]).connection(connection);
    return Number(row.held) === 1;
  };
  try {
    if (!(await ask('SELECT GET_LOCK(?, 0) AS held'))) return false;
    try {
      await work();
    } finally {
      await ask('SELECT RELEASE_LOCK(?) AS held');
    }
    return true;
  } finally {
    await client.releaseConnection(connection);
  }
}
