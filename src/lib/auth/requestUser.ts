import type { APIContext } from 'astro';
import { findUserIdByAccessToken } from '#db/queries/accessTokens';
import { findUserById } from '#db/queries/users';
import { sessionCookieName, userOfSession, type SignedInUser } from './sessions';

/** The person whom a request's access token or session cookie names, or null. */
export async function userOfRequest({
  request,
  cookies,
}: Pick<APIContext, 'request' | 'cookies'>): Promise<SignedInUser | null> {
  const token = bearerToken(request);
  if (token !== null) return token.startsWith('bp_') ? userOfAccessToken(token) : null;
  const sessionId = cookies.get(sessionCookieName())?.value;
  return sessionId ? userOfSession(sessionId) : null;
}

/** The token of an `Authorization: Bearer` header, or null. */
export function bearerToken(request: { headers: Pick<Headers, 'get'> }): string | null {
  return /^Bearer +([\w-]{1,200})$/i.exec(request.headers.get('authorization') ?? '')?.[1] ?? null;
}

async function userOfAccessToken(token: string): Promise<SignedInUser | null> {
  const userId = await findUserIdByAccessToken(token, new Date());
  const user = userId === undefined ? undefined : await findUserById(userId);
  if (!user || user.disabledAt) return null;
  return { id: user.id, email: user.email, name: user.name, isAdministrator: user.isAdministrator };
}
