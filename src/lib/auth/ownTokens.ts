import { type NewAccessToken } from '#lib/contracts/accessTokens';
import { makeAccessToken } from '#lib/services/people/accessTokens';
import { factorFirst, networksWantingFactor } from './factorWanted';
import type { SignedInUser } from './sessions';

/**
 * Makes an access token of a person, told this once. A token is not asked for a second factor, so that making one is.
 * @throws {Problem} 403 where a network of the person asks for one and there is none.
 */
export async function makeOwnToken(user: SignedInUser, token: NewAccessToken): Promise<string> {
  if (user.lacksSecondFactor && (await networksWantingFactor(user)).length > 0) throw factorFirst();
  return makeAccessToken(user.id, token);
}
