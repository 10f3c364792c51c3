import { findMast, type MastRow } from '#db/queries/masts';
import { findMastByToken, noteMastTokenUse, type TokenMast } from '#db/queries/mastTokens';
import { notFound, Problem } from '#lib/http/problem';
import { bearerToken } from './requestUser';

/** The mast of a token that was sent; notes that it was used. @throws {Problem} 401 */
export async function requireMastToken(request: Parameters<typeof bearerToken>[0]): Promise<TokenMast> {
  const secret = bearerToken(request);
  const found = secret === null ? undefined : await findMastByToken(secret);
  if (!found) {
    throw new Problem(401, 'bad-token', 'Unknown mast token', 'Send the mast’s token that is in force.', {
      headers: { 'WWW-Authenticate': 'Bearer' },
    });
  }
  const now = new Date();
  if (!found.lastUsedAt || now.getTime() - found.lastUsedAt.getTime() > 60_000)
    await noteMastTokenUse(found.tokenId, now);
  return found;
}

/** A mast of the network by its code. @throws {Problem} 404 */
export async function requireMast(networkId: number, code: string | undefined): Promise<MastRow> {
  const mast = await findMast(networkId, code ?? '');
  if (!mast) throw notFound('The network has no mast with this code.');
  return mast;
}
