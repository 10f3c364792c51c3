import { findCredentials } from '#db/queries/users';
import { invalidFields, Problem } from '#lib/http/problem';
import { type OwnPasswordChange } from '#lib/contracts/people';
import { changeOwnPassword } from '#lib/services/people/passwords';
import { allowAttempt, forgetAttempts } from './attempts';
import { hashPassword, verifyPassword } from './passwords';
import type { SignedInUser } from './sessions';

/**
 * Gives a person the new password, if the current one fits, and ends the sessions elsewhere. Attempts are counted: an open
 * browser must not be a way to guess.
 * @throws {Problem} 422 with the field that does not fit, 429 after too many attempts.
 */
export async function changePassword(
  user: SignedInUser,
  sessionId: string,
  { currentPassword, newPassword }: OwnPasswordChange,
): Promise<void> {
  const attemptKey = `password ${user.id}`;
  const retryAfterSec = allowAttempt(attemptKey, Date.now());
  if (retryAfterSec > 0) throw tooManyAttempts(retryAfterSec);
  const found = await findCredentials(user.email);
  if (!found || !(await verifyPassword(found.passwordHash, currentPassword))) {
    throw invalidFields([{ field: 'currentPassword', message: 'is not your current password' }]);
  }
  forgetAttempts(attemptKey);
  if (currentPassword === newPassword) {
    throw invalidFields([{ field: 'newPassword', message: 'must differ from the current one' }]);
  }
  await changeOwnPassword(user.id, await hashPassword(newPassword), sessionId);
}

function tooManyAttempts(retryAfterSec: number): Problem {
  const minutes = Math.ceil(retryAfterSec / 60);
  return new Problem(
    429,
    'too-many-attempts',
    'Too many attempts',
    `Too many attempts with a wrong password. Try again in ${minutes} min. The password was not changed.`,
    { headers: { 'Retry-After': String(retryAfterSec) } },
  );
}
