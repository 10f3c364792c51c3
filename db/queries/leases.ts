import { isLockConflict, pool, type Connection } from './connection';

/**
 * Seconds that a lease lasts unless it is renewed, by the clock of the database. Holders renew it three times as often, so that nodes of the
 * head whose clocks differ by some seconds agree on who has it.
 */
export const LEASE_SEC = 30;

/** Given longer than this, it was given by a clock that was ahead. */
const LONGEST_SEC = 2 * LEASE_SEC;

/** A lease that is held. */
export interface LeaseRow {
  name: string;
  holder: string;
  /** Epoch seconds. */
  takenAtSec: number;
}

/**
 * Takes a lease that is free, has run out, or is the holder's already. Each try writes one row, of which the first commit wins, on any
 * node of the head.
 * @returns whether the holder has it now.
 */
export async function takeLease(name: string, holder: string, conn: Connection = pool()): Promise<boolean> {
  try {
    const [taken] = (await conn.raw(
      `UPDATE leases SET holder = ?, taken_at = UNIX_TIMESTAMP(), expires_at = UNIX_TIMESTAMP() + ${LEASE_SEC}
       WHERE name = ? AND (holder = ? OR expires_at <= UNIX_TIMESTAMP() OR expires_at > UNIX_TIMESTAMP() + ${LONGEST_SEC})`,
      [holder, name, holder],
    )) as [{ affectedRows: number }];
    if (taken.affectedRows === 1) return true;
    const [made] = (await conn.raw(
      `INSERT IGNORE INTO leases (name, holder, taken_at, expires_at)
       VALUES (?, ?, UNIX_TIMESTAMP(), UNIX_TIMESTAMP() + ${LEASE_SEC})`,
      [name, holder],
    )) as [{ affectedRows: number }];
    return made.affectedRows === 1;
  } catch (error) {
    if (isLockConflict(error)) return false;
    throw error;
  }
}

/** Renews all that a holder has. @returns their names. */
export async function renewLeases(holder: string, conn: Connection = pool()): Promise<string[]> {
  await conn.raw(`UPDATE leases SET expires_at = UNIX_TIMESTAMP() + ${LEASE_SEC} WHERE holder = ?`, [holder]);
  return conn('leases').where({ holder }).pluck('name');
}

/** Gives a lease back, where the holder has it still. */
export async function freeLease(name: string, holder: string, conn: Connection = pool()): Promise<void> {
  await conn('leases').where({ name, holder }).delete();
}

/** Leases that are held, by name. */
export async function listLeases(conn: Connection = pool()): Promise<LeaseRow[]> {
  return conn('leases')
    .whereRaw('expires_at > UNIX_TIMESTAMP()')
    .orderBy('name')
    .select({ name: 'name', holder: 'holder', takenAtSec: 'taken_at' });
}
