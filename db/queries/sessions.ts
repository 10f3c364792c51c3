import { createHash } from 'node:crypto';
import { pool, type Connection } from './connection';

/** A signed-in session. Only a digest of the id is stored: a copy of the table signs nobody in. */
export interface SessionRow {
  userId: string;
  expiresAt: Date;
  endsAt: Date;
}

/** Where a session was begun, for its owner to recognise. It goes with the session. */
export interface SessionOrigin {
  address: string | null;
  agent: string | null;
}

const LONGEST_ADDRESS = 45;
const LONGEST_AGENT = 255;

export async function insertSession(
  id: string,
  session: SessionRow & Partial<SessionOrigin>,
  conn: Connection = pool(),
): Promise<void> {
  await conn('sessions').insert({
    id_digest: sessionDigest(id),
    user_id: session.userId,
    expires_at: session.expiresAt,
    ends_at: session.endsAt,
    from_address: session.address?.slice(0, LONGEST_ADDRESS) ?? null,
    agent: session.agent?.slice(0, LONGEST_AGENT) ?? null,
    created_at: new Date(),
  });
}

export async function findSession(
  id: string,
  conn: Connection = pool(),
): Promise<(SessionRow & { lastSeenAt: Date | null }) | undefined> {
  return conn('sessions')
    .where({ id_digest: sessionDigest(id) })
    .first({ userId: 'user_id', expiresAt: 'expires_at', endsAt: 'ends_at', lastSeenAt: 'last_seen_at' });
}

export async function noteSessionSeen(id: string, at: Date, conn: Connection = pool()): Promise<void> {
  await conn('sessions')
    .where({ id_digest: sessionDigest(id) })
    .update({ last_seen_at: at });
}

export async function moveSessionExpiry(
  id: string,
  expiresAt: Date,
  conn: Connection = pool(),
): Promise<void> {
  await conn('sessions')
    .where({ id_digest: sessionDigest(id) })
    .update({ expires_at: conn.raw('LEAST(?, ends_at)', [expiresAt]) });
}

export async function deleteSession(id: string, conn: Connection = pool()): Promise<void> {
  await conn('sessions')
    .where({ id_digest: sessionDigest(id) })
    .delete();
}

export async function deleteSessionsOf(userId: string, conn: Connection = pool()): Promise<void> {
  await conn('sessions').where({ user_id: userId }).delete();
}

/** A session as its owner sees it; the digest names it without being of use to anybody. */
export interface SessionEntry extends SessionOrigin {
  idDigest: string;
  createdAt: Date;
  /** To the minute. */
  lastSeenAt: Date;
  expiresAt: Date;
}

/** Sessions of a person that have not expired, newest first. */
export async function listSessions(userId: string, conn: Connection = pool()): Promise<SessionEntry[]> {
  return conn('sessions')
    .where({ user_id: userId })
    .where('expires_at', '>', new Date())
    .orderBy('created_at', 'desc')
    .select({
      idDigest: 'id_digest',
      address: 'from_address',
      agent: 'agent',
      createdAt: 'created_at',
      lastSeenAt: conn.raw('COALESCE(last_seen_at, created_at)'),
      expiresAt: 'expires_at',
    });
}

/** Ends a session of that person, named by its digest; answers whether there was one to end. */
export async function deleteSessionOf(userId: string, idDigest: string, conn: Connection): Promise<boolean> {
  return (await conn('sessions').where({ user_id: userId, id_digest: idDigest }).delete()) > 0;
}

/** Ends every session of a person but the one named by its id. */
export async function deleteOtherSessions(userId: string, keptId: string, conn: Connection): Promise<number> {
  return conn('sessions')
    .where({ user_id: userId })
    .whereNot({ id_digest: sessionDigest(keptId) })
    .delete();
}

export async function deleteExpiredSessions(now: Date, conn: Connection = pool()): Promise<number> {
  return conn('sessions').where('expires_at', '<=', now).delete();
}

/** Digest under which a session is stored. */
export function sessionDigest(id: string): string {
  return createHash('sha256').update(id).digest('hex');
}
