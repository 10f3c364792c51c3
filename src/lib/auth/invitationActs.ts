import { type NewInvitation } from '#lib/contracts/invitations';
import { invalidFields, notFound, Problem } from '#lib/http/problem';
import { invite, sendInvitationAgain, withdrawInvitation } from '#lib/services/people/invitations';
import { requireNetworks } from './personActs';

const NO_INVITATION = 'There is no such open invitation: it was accepted or withdrawn.';

/** Invites somebody by e-mail. @returns the invitation's id. @throws {Problem} 422 with what is wrong by field. */
export async function inviteByAdministrator(input: NewInvitation, byUserId: string): Promise<number> {
  await requireNetworks(input.roles);
  const inviting = await invite(input, byUserId);
  if (inviting.outcome === 'invited') return inviting.id;
  const message =
    inviting.outcome === 'email-taken'
      ? 'belongs to somebody already; disabled people count, too'
      : 'is invited already: send that invitation again, or withdraw it first';
  throw invalidFields([{ field: 'email', message }]);
}

/** Sends an open invitation again. @throws {Problem} 404, 409 */
export async function sendAgain(id: string | undefined, byUserId: string): Promise<void> {
  const outcome = await sendInvitationAgain(idOf(id), byUserId);
  if (outcome === 'unknown') throw notFound(NO_INVITATION);
  if (outcome === 'too-often') {
    const detail = 'It was sent twenty times. Withdraw it, and invite anew if the address is right.';
    throw new Problem(409, 'too-often', 'Not possible', detail);
  }
}

/** Takes an open invitation back. @throws {Problem} 404 */
export async function takeBack(id: string | undefined, byUserId: string): Promise<void> {
  if (!(await withdrawInvitation(idOf(id), byUserId))) throw notFound(NO_INVITATION);
}

const idOf = (text: string | undefined) => (/^\d{1,9}$/.test(text ?? '') ? Number(text) : 0);
