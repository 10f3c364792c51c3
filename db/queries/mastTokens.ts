import { createHash, randomBytes } from 'node:crypto';
import { pool, type Connection } from './connection';

export interface MastTokenRow {
  id: number;
  createdAt: Date;
  revokedAt: Date | null;
  lastUsedAt: Date | null;
}

/** Makes a token and answers it in the clear, the only time that it can be seen. Others of the mast stay in force. */
export async function insertMastToken(
  mastId: number,
  createdBy: string | null,
  conn: Connection,
): Promise<{ id: number; token: string }> {
  const token = `bm_${randomBytes(32).toString('base64url')}`;
  const [id] = await conn('mast_tokens').insert({
    mast_id: mastId,
    digest: digestOf(token),
    created_by: createdBy,
    created_at: new Date(),
  });
  return { id: Number(id), token };
}

/** What receiving must know of the mast whose token it was given. */
export interface TokenMast {
  tokenId: number;
  lastUsedAt: Date | null;
  id: number;
  maximumAgeSec: number;
}

/** The mast that a token in force belongs to; none for a retired one. */
export async function findMastByToken(
  secret: string,
  conn: Connection = pool(),
): Promise<TokenMast | undefined> {
  return conn('mast_tokens')
    .join('masts', 'masts.id', 'mast_tokens.mast_id')
    .where({ digest: digestOf(secret), revoked_at: null, retired_at: null })
    .first({
      tokenId: 'mast_tokens.id',
      lastUsedAt: 'mast_tokens.last_used_at',
      id: 'masts.id',
      maximumAgeSec: 'masts.maximum_age_sec',
    });
}

/** Tokens of a mast, newest first. */
export async function listMastTokens(mastId: number, conn: Connection = pool()): Promise<MastTokenRow[]> {
  return conn('mast_tokens').where({ mast_id: mastId }).orderBy('id', 'desc').select({
    id: 'id',
    createdAt: 'created_at',
    revokedAt: 'revoked_at',
    lastUsedAt: 'last_used_at',
  });
}

export async function noteMastTokenUse(id: number, now: Date, conn: Connection = pool()): Promise<void> {
  await conn('mast_tokens').where({ id }).update({ last_used_at: now });
}

/** Ends a token of the mast at once; answers whether there was one to end. */
export async function revokeMastToken(mastId: number, id: number, conn: Connection): Promise<boolean> {
  const changed = await conn('mast_tokens')
    .where({ id, mast_id: mastId, revoked_at: null })
    .update({ revoked_at: new Date() });
  return changed > 0;
}

function digestOf(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
