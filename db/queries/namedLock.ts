import { config } from '#lib/config/index';
import { askLocks } from '../locks';

/** Held by this process. The server would grant it a second time, because all its locks share a connection. */
const held = new Set<string>();

/**
 * Runs `work` while nobody else runs it, in this process or another, or not at all. The lock saves double work; it is not what makes the
 * work correct (it is lost with its connection).
 * @returns whether it ran.
 */
export async function withNamedLock(name: string, work: () => Promise<void>): Promise<boolean> {
  const lock = `bittern:${config().database.name}:${name}`.slice(0, 64);
  if (held.has(lock)) return false;
  held.add(lock);
  try {
    if (Number(await askLocks('SELECT GET_LOCK(?, 0)', [lock])) !== 1) return false;
    try {
      await work();
    } finally {
      // A connection that is lost has released it.
      await askLocks('SELECT RELEASE_LOCK(?)', [lock]).catch(() => undefined);
    }
    return true;
  } finally {
    held.delete(lock);
  }
}
