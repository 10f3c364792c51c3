import type { APIContext } from 'astro';
import { findAccessToken } from '#db/queries/accessTokens';
import { findUserById } from '#db/queries/users';
import { requireAccountPace } from './accountPace';
import { sessionCookieName, userOfSession, type SignedInUser } from './sessions';
import { requireScope } from './tokenScope';

/**
 * The person whom a request's access token or session cookie names, or null.
 * @throws {Problem} 403 for what the token is not for, 429 above the pace of an account.
 */
export async function userOfRequest(
  context: Pick<APIContext, 'request' | 'cookies'>,
): Promise<SignedInUser | null> {
  const user = await userNamedBy(context);
  if (user) requireAccountPace(user.id, Date.now());
  return user;
}

async function userNamedBy({
  request,
  cookies,
}: Pick<APIContext, 'request' | 'cookies'>): Promise<SignedInUser | null> {
  const token = bearerToken(request);
  if (token !== null) return token.startsWith('bp_') ? userOfAccessToken(token, request) : null;
  const sessionId = cookies.get(sessionCookieName())?.value;
  return sessionId ? userOfSession(sessionId) : null;
}

/** The token of an `Authorization: Bearer` header, or null. */
export function bearerToken(request: { headers: Pick<Headers, 'get'> }): string | null {
  return /^Bearer +([\w-]{1,200})$/i.exec(request.headers.get('authorization') ?? '')?.[1] ?? null;
}

async function userOfAccessToken(secret: string, request: Request): Promise<SignedInUser | null> {
  const token = await findAccessToken(secret, new Date());
  const user = token && (await findUserById(token.userId));
  if (!user || user.disabledAt) return null;
  requireScope(token, request.method, new URL(request.url).pathname);
  return { id: user.id, email: user.email, name: user.name, isAdministrator: user.isAdministrator };
}
