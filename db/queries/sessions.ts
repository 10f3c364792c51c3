import { createHash } from 'node:crypto';
import { pool, type Connection } from './connection';

/** A signed-in session. Only a digest of the id is stored: a copy of the table signs nobody in. */
export interface SessionRow {
  userId: string;
  expiresAt: Date;
  endsAt: Date;
}

export async function insertSession(
  id: string,
  session: SessionRow,
  conn: Connection = pool(),
): Promise<void> {
  await conn('sessions').insert({
    id_digest: digestOf(id),
    user_id: session.userId,
    expires_at: session.expiresAt,
    ends_at: session.endsAt,
    created_at: new Date(),
  });
}

export async function findSession(id: string, conn: Connection = pool()): Promise<SessionRow | undefined> {
  return conn('sessions')
    .where({ id_digest: digestOf(id) })
    .first({ userId: 'user_id', expiresAt: 'expires_at', endsAt: 'ends_at' });
}

export async function moveSessionExpiry(
  id: string,
  expiresAt: Date,
  conn: Connection = pool(),
): Promise<void> {
  await conn('sessions')
    .where({ id_digest: digestOf(id) })
    .update({ expires_at: conn.raw('LEAST(?, ends_at)', [expiresAt]) });
}

export async function deleteSession(id: string, conn: Connection = pool()): Promise<void> {
  await conn('sessions')
    .where({ id_digest: digestOf(id) })
    .delete();
}

export async function deleteSessionsOf(userId: string, conn: Connection = pool()): Promise<void> {
  await conn('sessions').where({ user_id: userId }).delete();
}

export async function deleteExpiredSessions(now: Date, conn: Connection = pool()): Promise<number> {
  return conn('sessions').where('expires_at', '<=', now).delete();
}

function digestOf(id: string): string {
  return createHash('sha256').update(id).digest('hex');
}
