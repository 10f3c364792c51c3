import { createHash } from 'node:crypto';
import { findCredentialsById, type UserRow } from '#db/queries/users';
import { cookieName } from '#lib/http/cookieName';
import { isSameSignature, purposeMac } from '#lib/services/purposeMac';
import { cookieNamed, type SessionCookie } from './sessions';

const NAME = 'second';
const HOLDS_SEC = 600;

/** The cookie of a sign-in whose password fitted and whose code is awaited. It opens nothing by itself. */
export function pendingCookie(userId: string, passwordHash: string, nowSec: number): SessionCookie {
  const untilSec = nowSec + HOLDS_SEC;
  return cookieNamed(NAME, `${userId}.${untilSec}.${signatureOf(userId, untilSec, passwordHash)}`, HOLDS_SEC);
}

/** The cookie that ends it. */
export const noPendingCookie = (): SessionCookie => cookieNamed(NAME, '', 0);

/** The person whose code is awaited; null once the time is over, or where the password was changed meanwhile. */
export async function pendingUser(
  cookies: { get(name: string): { value: string } | undefined },
  nowSec: number,
): Promise<UserRow | null> {
  const [userId = '', until = '', signature = ''] = (cookies.get(cookieName(NAME))?.value ?? '').split('.');
  if (!/^\d{1,12}$/.test(until) || nowSec >= Number(until)) return null;
  const found = await findCredentialsById(userId);
  if (!found || found.user.disabledAt) return null;
  const expected = signatureOf(userId, Number(until), found.passwordHash);
  return isSameSignature(signature, expected) ? found.user : null;
}

function signatureOf(userId: string, untilSec: number, passwordHash: string): string {
  const stand = createHash('sha256').update(passwordHash).digest('hex');
  return purposeMac('pending sign-in', `${userId} ${untilSec} ${stand}`).toString('base64url');
}
