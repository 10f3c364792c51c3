import { hasSecondFactor } from '#db/queries/secondFactors';
import { findCredentials, type UserRow } from '#db/queries/users';
import { addressKey } from '#lib/http/rateLimit';
import { isOwnDevice, noteSignIn, type SignInOrigin } from '#lib/services/people/signIns';
import { checkFactor } from './checkFactor';
import { deviceCookie } from './device';
import { hashPassword, verifyPassword } from './passwords';
import { noPendingCookie, pendingCookie } from './pendingSignIn';
import { startSession, type SessionCookie } from './sessions';
import { SignInBudgets } from './signInBudgets';

export type SignInResult =
  | { outcome: 'signed-in'; cookies: SessionCookie[] }
  /** The password fits; `cookies` keep that for a while. */
  | { outcome: 'code-needed'; cookies: SessionCookie[] }
  | { outcome: 'wrong' | 'wrong-code' }
  | { outcome: 'too-many'; retryAfterSec: number };

const budgets = new SignInBudgets();
let decoyHash: Promise<string> | undefined;

/**
 * Signs a person in by e-mail and password, and by a code where the person has a second factor. An unknown address takes as long
 * as a wrong password and answers the same.
 */
export async function signIn(
  { email, password, code }: { email: string; password: string; code?: string | undefined },
  from: SignInOrigin,
): Promise<SignInResult> {
  const [found, isOwn] = await Promise.all([findCredentials(email), isOwnDevice(email, from.device)]);
  const trying = {
    account: found?.user.id ?? email.toLowerCase(),
    address: addressKey(from.address),
    ownDevice: isOwn ? from.device : null,
  };
  const retryAfterSec = budgets.begin(trying, Date.now());
  if (retryAfterSec > 0) return { outcome: 'too-many', retryAfterSec };
  decoyHash ??= hashPassword('no such person');
  const fits = await verifyPassword(found?.passwordHash ?? (await decoyHash), password);
  if (!found || !fits || found.user.disabledAt) return { outcome: 'wrong' };
  budgets.succeed(trying, Date.now());
  const { user, passwordHash } = found;
  if (!(await hasSecondFactor(user.id))) return finish(user, from, false);
  if (code) return signInWithCode(user, code, from);
  const pending = pendingCookie(user.id, passwordHash, Math.floor(Date.now() / 1000));
  return { outcome: 'code-needed', cookies: [pending] };
}

/** Signs in a person whose password fitted, by a code of the authenticator or a recovery code. */
export async function signInWithCode(user: UserRow, code: string, from: SignInOrigin): Promise<SignInResult> {
  const ownDevice = (await isOwnDevice(user.email, from.device)) ? from.device : null;
  const check = await checkFactor(user, code, { ownDevice, recovery: true });
  if (check.outcome === 'too-many') return check;
  if (check.outcome === 'wrong') return { outcome: 'wrong-code' };
  return finish(user, from, true);
}

/** Starts the session of somebody who has proved who he or she is. */
export async function finish(
  user: { id: string; email: string },
  from: SignInOrigin,
  hadSecondFactor: boolean,
): Promise<{ outcome: 'signed-in'; cookies: SessionCookie[] }> {
  const device = deviceCookie(from.device);
  const session = await startSession(user.id, from);
  const origin = { ...from, addressKey: addressKey(from.address), device: device.value };
  await noteSignIn(user, origin, hadSecondFactor);
  return { outcome: 'signed-in', cookies: [session, device, noPendingCookie()] };
}
