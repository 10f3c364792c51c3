import { pool, type Connection } from './connection';
import { secretDigest } from './secretDigest';

/** What a mailed link lets its holder do, once. */
export type AccountTokenPurpose = 'invitation' | 'password-reset';

/** Keeps a token that is being mailed, by its digest. `subject`: id of the invitation, or of the person. */
export async function insertAccountToken(
  token: { secret: string; purpose: AccountTokenPurpose; subject: string; createdAt: Date; expiresAt: Date },
  conn: Connection,
): Promise<void> {
  await conn('account_tokens').insert({
    digest: secretDigest(token.secret),
    purpose: token.purpose,
    subject: token.subject,
    created_at: token.createdAt,
    expires_at: token.expiresAt,
  });
}

/** What a token in force is about; its row is locked until the transaction ends, so that it opens something once. */
export async function findAccountToken(
  secret: string,
  purpose: AccountTokenPurpose,
  now: Date,
  transaction: Connection,
): Promise<string | undefined> {
  const row: { subject: string } | undefined = await transaction('account_tokens')
    .where({ digest: secretDigest(secret), purpose })
    .where('expires_at', '>', now)
    .forUpdate()
    .first('subject');
  return row?.subject;
}

/** How many were made for a subject since an instant. */
export async function countAccountTokens(
  purpose: AccountTokenPurpose,
  subject: string,
  since: Date,
  conn: Connection,
): Promise<number> {
  const row = await conn('account_tokens')
    .where({ purpose, subject })
    .where('created_at', '>=', since)
    .first({ count: conn.raw('COUNT(*)') });
  return Number(row.count);
}

/** Ends every token of a subject. */
export async function deleteAccountTokens(
  purpose: AccountTokenPurpose,
  subject: string,
  conn: Connection,
): Promise<void> {
  await conn('account_tokens').where({ purpose, subject }).delete();
}

export async function deleteAccountTokensExpired(now: Date, conn: Connection = pool()): Promise<number> {
  return conn('account_tokens').where('expires_at', '<=', now).delete();
}
