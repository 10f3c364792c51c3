import { pool, type Connection } from './connection';

/** A person's browser by its cookie, a network address, or both together as a browser at an address. */
export interface Origin {
  kind: 'device' | 'address' | 'place';
  digest: Buffer;
}

/** Notes where a person signed in from. */
export async function noteOrigins(
  userId: string,
  origins: readonly Origin[],
  at: Date,
  conn: Connection,
): Promise<void> {
  if (origins.length === 0) return;
  const rows = origins.map(({ kind, digest }) => ({
    user_id: userId,
    kind,
    digest,
    first_at: at,
    last_at: at,
  }));
  await conn('known_origins').insert(rows).onConflict(['user_id', 'kind', 'digest']).merge(['last_at']);
}

/** Kinds of the given origins that the person signed in from before. */
export async function listKnownKinds(
  userId: string,
  origins: readonly Origin[],
  conn: Connection = pool(),
): Promise<Origin['kind'][]> {
  return conn('known_origins')
    .where({ user_id: userId })
    .whereIn(
      ['kind', 'digest'],
      origins.map(({ kind, digest }) => [kind, digest]),
    )
    .pluck('kind');
}

/** Whether a browser has signed this address in before. */
export async function isKnownDevice(
  email: string,
  digest: Buffer,
  conn: Connection = pool(),
): Promise<boolean> {
  const row = await conn('known_origins')
    .join('users', 'users.id', 'known_origins.user_id')
    .where({ 'users.email': email, kind: 'device', digest })
    .first('known_origins.kind');
  return row !== undefined;
}

/** Forgets a person's browsers and addresses. */
export async function deleteOriginsOf(userId: string, conn: Connection): Promise<void> {
  await conn('known_origins').where({ user_id: userId }).delete();
}

export async function deleteOriginsBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('known_origins').where('last_at', '<', before).delete();
}
