import {
  insertAccessToken,
  listAccessTokens,
  revokeAccessToken,
  type AccessTokenRow,
} from '#db/queries/accessTokens';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { type NewAccessToken } from '#lib/contracts/accessTokens';

const DAY_MS = 86_400_000;

/** A person's tokens, newest first, ended ones too; the secrets themselves are kept nowhere. */
export function accessTokensOf(userId: string): Promise<AccessTokenRow[]> {
  return listAccessTokens(userId);
}

/** Makes a token for a person's scripts, told this once. */
export function makeAccessToken(
  userId: string,
  { name, days, access, families }: NewAccessToken,
): Promise<string> {
  const expiresAt = new Date(Date.now() + days * DAY_MS);
  return inTransaction(async (transaction) => {
    const token = await insertAccessToken({ userId, name, expiresAt, access, families }, transaction);
    const detail = { expiresAt: expiresAt.toISOString(), access, families };
    const subject = `person ${userId}`;
    await appendAudit({ userId, networkId: null, action: 'access-token.make', subject, detail }, transaction);
    return token;
  });
}

/** Ends a token of the person at once; answers whether there was one to end. */
export function endAccessToken(userId: string, id: number): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await revokeAccessToken(userId, id, transaction);
    const subject = `person ${userId}`;
    if (isEnded) {
      await appendAudit(
        { userId, networkId: null, action: 'access-token.revoke', subject, detail: { tokenId: id } },
        transaction,
      );
    }
    return isEnded;
  });
}
