import type { APIContext } from 'astro';
import { findStation, type StationRow } from '#db/queries/stations';
import { findStationByToken, noteTokenUse, type TokenStation } from '#db/queries/stationTokens';
import { notAllowed, notFound, Problem, signInFirst } from '#lib/http/problem';
import { factorFirst } from './factorWanted';
import { passwordFirst } from './handedOver';
import { enterNetwork, type NetworkAccess } from './networkAccess';
import { bearerToken } from './requestUser';
import type { Role } from './roles';
import { sessionCookieName, type SignedInUser } from './sessions';

/** The signed-in person. @throws {Problem} 401, 403 where a password that was handed over has to be changed first */
export function requireUser(context: Pick<APIContext, 'locals'>): SignedInUser {
  const user = requireAnyUser(context);
  if (user.mustChangePassword) throw passwordFirst();
  return user;
}

function requireAnyUser({ locals }: Pick<APIContext, 'locals'>): SignedInUser {
  if (!locals.user) throw signInFirst();
  return locals.user;
}

/** The signed-in administrator, with the second factor where a network asks for one. @throws {Problem} 401, 403 */
export function requireAdministrator(context: Pick<APIContext, 'locals'>): SignedInUser {
  const user = requireUser(context);
  if (!user.isAdministrator) throw notAllowed('Only an administrator may do this.');
  if (user.administrationIsClosed) throw factorFirst();
  return user;
}

/**
 * The person signed in in a browser, with the session's id: for what an access token must not do, such as making another
 * one that outlives it.
 * @throws {Problem} 401, 403
 */
export function requireSession(context: Pick<APIContext, 'locals' | 'cookies' | 'request'>): {
  user: SignedInUser;
  sessionId: string;
} {
  return { user: requireUser(context), sessionId: requireSessionId(context) };
}

/** The same for changing one's password, which a handed over one is good for alone. @throws {Problem} 401, 403 */
export function requireSessionForPassword(
  context: Parameters<typeof requireSession>[0],
): ReturnType<typeof requireSession> {
  return { user: requireAnyUser(context), sessionId: requireSessionId(context) };
}

function requireSessionId({ cookies, request }: Pick<APIContext, 'cookies' | 'request'>): string {
  const sessionId = cookies.get(sessionCookieName())?.value;
  if (sessionId && bearerToken(request) === null) return sessionId;
  throw notAllowed('An access token may not do this: sign in.');
}

/** The administrator signed in in a browser. @throws {Problem} 401, 403 */
export function requireAdministratorSession(context: Parameters<typeof requireSession>[0]): SignedInUser {
  requireAdministrator(context);
  return requireSession(context).user;
}

/** The signed-in person inside a network, for what `roles` may do. @throws {Problem} 401, 403, 404 */
export async function requireNetwork(
  context: Pick<APIContext, 'locals'>,
  slug: string | undefined,
  roles: readonly Role[],
): Promise<NetworkAccess> {
  return enterNetwork(requireUser(context), slug ?? '', roles);
}

/** A station of the network by its code. @throws {Problem} 404 */
export async function requireStation(networkId: number, code: string | undefined): Promise<StationRow> {
  const station = await findStation(networkId, code ?? '');
  if (!station) throw notFound('The network has no station with this code.');
  return station;
}

export type { TokenStation };

/** The station token that a monitor sent, whether it is in force or not. @throws {Problem} 401 */
export function sentStationToken(request: Parameters<typeof bearerToken>[0]): string {
  const secret = bearerToken(request);
  if (secret === null) throw badStationToken();
  return secret;
}

/** The station of a token that a monitor sent; notes that it was used. @throws {Problem} 401 */
export async function requireStationToken(request: Parameters<typeof bearerToken>[0]): Promise<TokenStation> {
  const found = await findStationByToken(sentStationToken(request));
  if (!found) throw badStationToken();
  const now = new Date();
  if (!found.lastUsedAt || now.getTime() - found.lastUsedAt.getTime() > 60_000)
    await noteTokenUse(found.tokenId, now);
  return found;
}

function badStationToken(): Problem {
  return new Problem(
    401,
    'bad-token',
    'Unknown station token',
    'Send the station’s token that is in force.',
    { headers: { 'WWW-Authenticate': 'Bearer' } },
  );
}
