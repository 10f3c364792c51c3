import { findCredentials } from '#db/queries/users';
import { invalidFields } from '#lib/http/problem';
import { type OwnPasswordChange } from '#lib/contracts/people';
import { changeOwnPassword } from '#lib/services/people/passwords';
import { hashChosen } from './chosenPassword';
import { passwordContextOf } from './passwordContext';
import { verifyPassword } from './passwords';
import type { SignedInUser } from './sessions';
import { Throttle } from './throttle';
import { tooManyAttempts } from './tooMany';

const tries = new Throttle({ free: 10, firstSec: 60, mostSec: 900, forgetSec: 3600 });

/**
 * Gives a person the new password, if the current one fits, and ends the sessions elsewhere.
 * @throws {Problem} 422 with the field that does not fit, 429 after too many attempts.
 */
export async function changePassword(
  user: SignedInUser,
  sessionId: string,
  { currentPassword, newPassword }: OwnPasswordChange,
): Promise<void> {
  await requireOwnPassword(user, currentPassword, 'currentPassword');
  if (currentPassword === newPassword) {
    throw invalidFields([{ field: 'newPassword', message: 'must differ from the current one' }]);
  }
  const hash = await hashChosen(newPassword, await passwordContextOf(user), 'newPassword');
  await changeOwnPassword(user.id, hash, sessionId);
}

/**
 * Makes sure that whoever is at an open browser knows the password. Attempts are counted: it must not be a way to guess.
 * @throws {Problem} 422 with the field that it was given in, 429 after too many attempts.
 */
export async function requireOwnPassword(user: SignedInUser, password: string, field: string): Promise<void> {
  const retryAfterSec = tries.waitSec(user.id, Date.now());
  if (retryAfterSec > 0) throw tooManyAttempts(retryAfterSec, 'Nothing was changed.');
  tries.count(user.id, Date.now());
  const found = await findCredentials(user.email);
  if (!found || !(await verifyPassword(found.passwordHash, password))) {
    throw invalidFields([{ field, message: 'is not your current password' }]);
  }
  tries.forget(user.id);
}
