import { invalidFields, Problem } from '#lib/http/problem';
import {
  beginFactor,
  begunSecret,
  confirmFactor,
  endFactor,
  replaceRecoveryCodes,
  secondFactorOf,
} from '#lib/services/people/secondFactor';
import { secretWords, totpUri } from '#lib/services/people/totp';
import { checkFactor } from './checkFactor';
import { networksWantingFactor } from './factorWanted';
import { requireOwnPassword } from './ownPassword';
import { makeRecoveryCodes } from './recoveryCodes';
import type { SignedInUser } from './sessions';
import { tooManyAttempts } from './tooMany';

/** A secret for an authenticator that waits for its first code: to read off, and as the address that a QR code holds. */
export interface BegunFactor {
  secret: string;
  uri: string;
}

/** How a person's second factor stands, and whether a network of theirs asks for one. */
export async function factorStateOf(user: SignedInUser) {
  const [state, wanting] = await Promise.all([secondFactorOf(user.id), networksWantingFactor(user)]);
  return { ...state, isRequired: wanting.length > 0 };
}

/** The secret that waits for its first code, or null. */
export async function begunFactorOf(user: SignedInUser): Promise<BegunFactor | null> {
  const secret = await begunSecret(user.id);
  return secret && { secret: secretWords(secret), uri: totpUri(secret, user.email) };
}

/** Begins a second factor with a new secret. @throws {Problem} 409 where one is in force. */
export async function beginOwnFactor(user: SignedInUser): Promise<BegunFactor> {
  await beginFactor(user.id);
  const begun = await begunFactorOf(user);
  if (!begun)
    throw refused('in-force', 'You have a second factor already. Take it away before you set up another.');
  return begun;
}

/** Puts the begun second factor into force with its first code. @returns the recovery codes, told this once. @throws {Problem} 409, 422, 429 */
export async function confirmOwnFactor(
  user: SignedInUser,
  code: string,
  sessionId: string,
): Promise<string[]> {
  const { isBegun } = await secondFactorOf(user.id);
  if (!isBegun) throw refused('not-begun', 'No second factor waits for its first code. Begin anew.');
  await requireCode(user, code, sessionId);
  const { codes, hashes } = await makeRecoveryCodes();
  await confirmFactor(user, hashes);
  return codes;
}

/** Makes new recovery codes, with a code of the authenticator. @throws {Problem} 409, 422, 429 */
export async function remakeRecoveryCodes(
  user: SignedInUser,
  code: string,
  sessionId: string,
): Promise<string[]> {
  if (!(await secondFactorOf(user.id)).isOn) throw refused('none', 'You have no second factor.');
  await requireCode(user, code, sessionId);
  const { codes, hashes } = await makeRecoveryCodes();
  await replaceRecoveryCodes(user, hashes);
  return codes;
}

/** Takes the person's own second factor away, with the password. @throws {Problem} 409 where a network asks for one, 422, 429 */
export async function endOwnFactor(user: SignedInUser, password: string): Promise<void> {
  const { isOn, isRequired } = await factorStateOf(user);
  if (!isOn) throw refused('none', 'You have no second factor.');
  if (isRequired) {
    throw refused(
      'required',
      'A network of yours requires a second factor, so that it stays. Nothing was changed.',
    );
  }
  await requireOwnPassword(user, password, 'password');
  await endFactor(user, user.id);
}

async function requireCode(user: SignedInUser, code: string, sessionId: string): Promise<void> {
  const check = await checkFactor(user, code, { ownDevice: sessionId, recovery: false });
  if (check.outcome === 'too-many') throw tooManyAttempts(check.retryAfterSec, 'Nothing was changed.');
  if (check.outcome === 'wrong') {
    const message =
      'is not the code that holds now: wait for the next one, and check the clock of the device';
    throw invalidFields([{ field: 'code', message }]);
  }
}

const refused = (code: string, detail: string) => new Problem(409, code, 'Not possible', detail);
