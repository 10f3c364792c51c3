import { changePassword } from '#lib/auth/ownPassword';
import { makeOwnToken } from '#lib/auth/ownTokens';
import type { SignedInUser } from '#lib/auth/sessions';
import { newAccessTokenSchema } from '#lib/contracts/accessTokens';
import { ownPasswordChangeSchema } from '#lib/contracts/people';
import { typedExactly, typedNumber, type FormValues } from '#lib/http/forms';
import { badRequest } from '#lib/http/problem';
import { endAccessToken } from '#lib/services/people/accessTokens';
import { endOtherSessions, endSessionOf } from '#lib/services/people/sessions';

export const ACCOUNT_DONE = {
  password: 'The password is changed. Sessions elsewhere have ended.',
  session: 'The session has ended.',
  sessions: 'Every other session has ended.',
  'no-session': 'That session was over already.',
  token: 'The token is made.',
  revoked: 'The token is revoked: it opens nothing any more.',
  'no-token': 'That token was no longer in force.',
} as const;

export interface AccountAct {
  done: keyof typeof ACCOUNT_DONE;
  /** A secret to show once. */
  secret?: string;
}

/** Does what a form of the account page asks. @throws {Problem} 4xx, and zod errors, with what is wrong by field. */
export async function actOnAccount(
  values: FormValues,
  { user, sessionId }: { user: SignedInUser; sessionId: string },
): Promise<AccountAct> {
  const { text } = values;
  switch (text['act']) {
    case 'password':
      return changeOwn(values, user, sessionId);
    case 'end-session':
      return { done: (await endSessionOf(user.id, text['session'] ?? '')) ? 'session' : 'no-session' };
    case 'end-others':
      await endOtherSessions(user.id, sessionId);
      return { done: 'sessions' };
    case 'make-token':
      return makeToken(values, user);
    case 'end-token':
      return { done: (await endAccessToken(user.id, idOf(text['token']))) ? 'revoked' : 'no-token' };
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}

async function changeOwn(values: FormValues, user: SignedInUser, sessionId: string): Promise<AccountAct> {
  const change = ownPasswordChangeSchema.parse({
    currentPassword: typedExactly(values, 'currentPassword'),
    newPassword: typedExactly(values, 'newPassword'),
  });
  await changePassword(user, sessionId, change);
  return { done: 'password' };
}

async function makeToken({ text, all }: FormValues, user: SignedInUser): Promise<AccountAct> {
  const token = newAccessTokenSchema.parse({
    name: text['name'] ?? '',
    days: typedNumber(text['days']) ?? 0,
    access: text['access'] ?? '',
    families: text['reach'] === 'some' ? all('families') : null,
  });
  return { done: 'token', secret: await makeOwnToken(user, token) };
}

/** A token's number, 0 for what is none. */
function idOf(text: string | undefined): number {
  return text !== undefined && /^\d{1,10}$/.test(text) ? Number(text) : 0;
}
