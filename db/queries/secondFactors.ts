import { pool, type Connection } from './connection';
import { jsonOf } from './json';

/** A person's second factor: the sealed secret of an authenticator, and the recovery codes that are left. */
export interface SecondFactorRow {
  sealedSecret: Buffer;
  /** Null: begun, and not asked for yet. */
  confirmedAt: Date | null;
  recoveryHashes: string[];
}

/** Begins a second factor anew; one that is confirmed already is left alone. */
export async function beginSecondFactor(
  userId: string,
  sealedSecret: Buffer,
  conn: Connection = pool(),
): Promise<void> {
  await conn('second_factors').where({ user_id: userId, confirmed_at: null }).delete();
  await conn('second_factors')
    .insert({
      user_id: userId,
      sealed_secret: sealedSecret,
      created_at: new Date(),
      recovery_hashes: JSON.stringify([]),
    })
    .onConflict('user_id')
    .ignore();
}

export async function findSecondFactor(
  userId: string,
  conn: Connection = pool(),
): Promise<SecondFactorRow | undefined> {
  return rowOf(await conn('second_factors').where({ user_id: userId }).first(COLUMNS));
}

/** The same, its row locked until the transaction ends. */
export async function lockSecondFactor(
  userId: string,
  transaction: Connection,
): Promise<SecondFactorRow | undefined> {
  return rowOf(await transaction('second_factors').where({ user_id: userId }).forUpdate().first(COLUMNS));
}

/** Whether a person signs in with a second factor. */
export async function hasSecondFactor(userId: string, conn: Connection = pool()): Promise<boolean> {
  const row = await conn('second_factors')
    .where({ user_id: userId })
    .whereNotNull('confirmed_at')
    .first('user_id');
  return row !== undefined;
}

/** Ids of everybody who signs in with a second factor. */
export async function listSecondFactorUsers(conn: Connection = pool()): Promise<string[]> {
  return conn('second_factors').whereNotNull('confirmed_at').pluck('user_id');
}

/** From now on the person is asked for it. */
export async function confirmSecondFactor(
  userId: string,
  recoveryHashes: readonly string[],
  conn: Connection,
): Promise<void> {
  await conn('second_factors')
    .where({ user_id: userId })
    .update({ confirmed_at: new Date(), recovery_hashes: JSON.stringify(recoveryHashes) });
}

export async function keepRecoveryHashes(
  userId: string,
  recoveryHashes: readonly string[],
  conn: Connection,
): Promise<void> {
  await conn('second_factors')
    .where({ user_id: userId })
    .update({ recovery_hashes: JSON.stringify(recoveryHashes) });
}

/** Takes a time step whose code was given; answers false when it, or a later one, was taken before. */
export async function takeStep(userId: string, step: number, conn: Connection = pool()): Promise<boolean> {
  const taken = await conn('second_factors')
    .where({ user_id: userId })
    .where('last_step', '<', step)
    .update({ last_step: step });
  return taken > 0;
}

/** Ends a person's second factor; answers whether there was one in force. */
export async function deleteSecondFactor(userId: string, conn: Connection): Promise<boolean> {
  const ended = await conn('second_factors').where({ user_id: userId }).whereNotNull('confirmed_at').delete();
  return ended > 0;
}

const COLUMNS = {
  sealedSecret: 'sealed_secret',
  confirmedAt: 'confirmed_at',
  recoveryHashes: 'recovery_hashes',
} as const;

function rowOf(
  row: (SecondFactorRow & { recoveryHashes: unknown }) | undefined,
): SecondFactorRow | undefined {
  return row && { ...row, recoveryHashes: jsonOf(row.recoveryHashes) };
}
