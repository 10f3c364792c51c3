import { randomBytes } from 'node:crypto';
import { pool, type Connection } from './connection';
import { jsonOf } from './json';
import { secretDigest } from './secretDigest';

/** What a token opens: reading alone or changes too, and which families of routes (null: all). */
export interface AccessTokenScope {
  access: 'read' | 'change';
  families: string[] | null;
}

/** A token by which a person's script reads with that person's roles. */
export interface AccessTokenRow extends AccessTokenScope {
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
  access: 'access',
  families: 'families',
} as const;

/** Makes a token and answers it in the clear, the only time that it can be seen. */
export async function insertAccessToken(
  token: { userId: string; name: string; expiresAt: Date } & AccessTokenScope,
  conn: Connection,
): Promise<string> {
  const secret = `bp_${randomBytes(32).toString('base64url')}`;
  await conn('access_tokens').insert({
    user_id: token.userId,
    name: token.name,
    digest: secretDigest(secret),
    created_at: new Date(),
    expires_at: token.expiresAt,
    access: token.access,
    families: token.families && JSON.stringify(token.families),
  });
  return secret;
}

export async function listAccessTokens(userId: string, conn: Connection = pool()): Promise<AccessTokenRow[]> {
  const rows = await conn('access_tokens')
    .where({ user_id: userId })
    .orderBy('id', 'desc')
    .select(TOKEN_COLUMNS);
  return rows.map((row) => ({ ...row, families: jsonOf(row.families) }));
}

/** Person that a token in force belongs to, and what it opens; notes its use, at most once a minute. */
export async function findAccessToken(
  secret: string,
  now: Date,
  conn: Connection = pool(),
): Promise<({ userId: string } & AccessTokenScope) | undefined> {
  const row:
    | { id: number; userId: string; lastUsedAt: Date | null; access: 'read' | 'change'; families: unknown }
    | undefined = await conn('access_tokens')
    .where({ digest: secretDigest(secret), revoked_at: null })
    .where('expires_at', '>', now)
    .first({
      id: 'id',
      userId: 'user_id',
      lastUsedAt: 'last_used_at',
      access: 'access',
      families: 'families',
    });
  if (!row) return undefined;
  if (!row.lastUsedAt || now.getTime() - row.lastUsedAt.getTime() > 60_000) {
    await conn('access_tokens').where({ id: row.id }).update({ last_used_at: now });
  }
  return { userId: row.userId, access: row.access, families: jsonOf(row.families) };
}

/** Ends a token of that person; answers whether there was one to end. */
export async function revokeAccessToken(userId: string, id: number, conn: Connection): Promise<boolean> {
  const changed = await conn('access_tokens')
    .where({ id, user_id: userId, revoked_at: null })
    .update({ revoked_at: new Date() });
  return changed > 0;
}
