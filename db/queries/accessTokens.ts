import { createHash, randomBytes } from 'node:crypto';
import { pool, type Connection } from './connection';

/** A token by which a person's script reads with that person's roles. */
export interface AccessTokenRow {
  id: number;
  name: string;
  createdAt: Date;
  expiresAt: Date;
  revokedAt: Date | null;
  lastUsedAt: Date | null;
}

const TOKEN_COLUMNS = {
  id: 'id',
  name: 'name',
  createdAt: 'created_at',
  expiresAt: 'expires_at',
  revokedAt: 'revoked_at',
  lastUsedAt: 'last_used_at',
} as const;

/** Makes a token and answers it in the clear, the only time that it can be seen. */
export async function insertAccessToken(
  token: { userId: string; name: string; expiresAt: Date },
  conn: Connection,
): Promise<string> {
  const secret = `bp_${randomBytes(32).toString('base64url')}`;
  await conn('access_tokens').insert({
    user_id: token.userId,
    name: token.name,
    digest: digestOf(secret),
    created_at: new Date(),
    expires_at: token.expiresAt,
  });
  return secret;
}

export async function listAccessTokens(userId: string, conn: Connection = pool()): Promise<AccessTokenRow[]> {
  return conn('access_tokens').where({ user_id: userId }).orderBy('id', 'desc').select(TOKEN_COLUMNS);
}

/** Person that a token in force belongs to; notes its use, at most once a minute. */
export async function findUserIdByAccessToken(
  secret: string,
  now: Date,
  conn: Connection = pool(),
): Promise<string | undefined> {
  const row: { id: number; userId: string; lastUsedAt: Date | null } | undefined = await conn('access_tokens')
    .where({ digest: digestOf(secret), revoked_at: null })
    .where('expires_at', '>', now)
    .first({ id: 'id', userId: 'user_id', lastUsedAt: 'last_used_at' });
  if (!row) return undefined;
  if (!row.lastUsedAt || now.getTime() - row.lastUsedAt.getTime() > 60_000) {
    await conn('access_tokens').where({ id: row.id }).update({ last_used_at: now });
  }
  return row.userId;
}

/** Ends a token of that person; answers whether there was one to end. */
export async function revokeAccessToken(userId: string, id: number, conn: Connection): Promise<boolean> {
  const changed = await conn('access_tokens')
    .where({ id, user_id: userId, revoked_at: null })
    .update({ revoked_at: new Date() });
  return changed > 0;
}

function digestOf(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
