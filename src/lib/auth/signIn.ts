import { findCredentials } from '#db/queries/users';
import { hashPassword, verifyPassword } from './passwords';
import { startSession, type SessionCookie } from './sessions';
import { allowAttempt, forgetAttempts } from './attempts';

export type SignInResult =
  | { outcome: 'signed-in'; cookie: SessionCookie }
  | { outcome: 'wrong' }
  | { outcome: 'too-many'; retryAfterSec: number };

let decoyHash: Promise<string> | undefined;

/**
 * Signs a person in by e-mail and password. An unknown address takes as long as a wrong password and answers the same.
 * Attempts are counted per address of origin and e-mail together, so nobody can lock somebody else out.
 */
export async function signIn(
  email: string,
  password: string,
  from: { address: string; agent: string | null },
): Promise<SignInResult> {
  const attemptKey = `${from.address} ${email.toLowerCase()}`;
  const retryAfterSec = allowAttempt(attemptKey, Date.now());
  if (retryAfterSec > 0) return { outcome: 'too-many', retryAfterSec };
  const found = await findCredentials(email);
  decoyHash ??= hashPassword('no such person');
  const fits = await verifyPassword(found?.passwordHash ?? (await decoyHash), password);
  if (!found || !fits || found.user.disabledAt) return { outcome: 'wrong' };
  forgetAttempts(attemptKey);
  return { outcome: 'signed-in', cookie: await startSession(found.user.id, from) };
}
