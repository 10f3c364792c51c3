import { updateUser } from '#db/queries/users';
import { inTransaction } from '#db/queries/connection';
import { hashPassword } from '#lib/auth/passwords';
import { callApi } from '../support/callApi';

/** Gives a test's person a password and answers the e-mail address that belongs to it. */
export async function givePassword(userId: string, password: string): Promise<string> {
  const passwordHash = await hashPassword(password);
  await inTransaction((transaction) => updateUser(userId, { passwordHash }, transaction));
  return `${userId.slice(0, 8)}@people.example`;
}

/** Signs in through the interface and answers the status. */
export async function signInStatus(email: string, password: string): Promise<number> {
  const answer = await callApi('POST', '/api/v1/session', { body: { email, password } });
  return answer.status;
}

/** Status of a call that needs a signed-in person and nothing else. */
export async function meStatus(call: { session?: string; token?: string }): Promise<number> {
  return (await callApi('GET', '/api/v1/me', call)).status;
}
