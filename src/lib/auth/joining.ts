import { type InvitationRow } from '#db/queries/invitations';
import { type UserRow } from '#db/queries/users';
import { type LinkPassword } from '#lib/contracts/invitations';
import { addressKey } from '#lib/http/rateLimit';
import { Problem } from '#lib/http/problem';
import { acceptInvitation, findInvitationOfLink } from '#lib/services/people/invitations';
import { askForPasswordLink, changePasswordByLink, findPersonOfLink } from '#lib/services/people/passwords';
import { type SignInOrigin } from '#lib/services/people/signIns';
import { hashChosen } from './chosenPassword';
import { contextOfNew, passwordContextOf } from './passwordContext';
import { type SessionCookie } from './sessions';
import { finish } from './signIn';
import { Throttle } from './throttle';
import { tooManyAttempts } from './tooMany';

const asking = new Throttle({ free: 10, firstSec: 60, mostSec: 900, forgetSec: 3600 });

/** The invitation that a link names. @throws {Problem} 410 where it does not hold. */
export async function requireInvitation(token: string): Promise<InvitationRow> {
  const invitation = await findInvitationOfLink(token);
  if (!invitation) throw linkOver('Ask whoever invited you for another one.');
  return invitation;
}

/** Makes the person whom a link invites, with the password chosen, and signs in. @throws {Problem} 409, 410, 422 */
export async function join({ token, password }: LinkPassword, from: SignInOrigin): Promise<SessionCookie[]> {
  const invitation = await requireInvitation(token);
  const hash = await hashChosen(password, await contextOfNew(invitation), 'password');
  const accepting = await acceptInvitation(token, hash);
  if (accepting.outcome === 'over') throw linkOver('Ask whoever invited you for another one.');
  if (accepting.outcome === 'email-taken') {
    throw new Problem(409, 'email-taken', 'Not possible', 'You have an account already: sign in with it.');
  }
  const { cookies } = await finish({ id: accepting.userId, email: invitation.email }, from, false);
  return cookies;
}

/**
 * Has a link to choose a new password mailed, if the address is somebody's; nothing tells whether it is.
 * @throws {Problem} 429 for a network address that asks too often, whomever it asks for.
 */
export async function askForLink(email: string, address: string): Promise<void> {
  const key = addressKey(address);
  const retryAfterSec = asking.waitSec(key, Date.now());
  if (retryAfterSec > 0) throw tooManyAttempts(retryAfterSec, 'No message was sent.');
  asking.count(key, Date.now());
  await askForPasswordLink(email);
}

/** The person whose password a link changes. @throws {Problem} 410 where it does not hold. */
export async function requirePersonOfLink(token: string): Promise<UserRow> {
  const person = await findPersonOfLink(token);
  if (!person) throw linkOver('Ask for another one where you sign in.');
  return person;
}

/** Changes the password by a mailed link. A second factor stays asked for. @throws {Problem} 410, 422 */
export async function usePasswordLink({ token, password }: LinkPassword): Promise<void> {
  const person = await requirePersonOfLink(token);
  const hash = await hashChosen(password, await passwordContextOf(person), 'password');
  if (!(await changePasswordByLink(token, hash))) throw linkOver('Ask for another one where you sign in.');
}

const linkOver = (wayOut: string) =>
  new Problem(
    410,
    'link-over',
    'The link does not hold',
    `It has run out, was used or was withdrawn. ${wayOut}`,
  );
