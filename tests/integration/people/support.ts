import { updateUser } from '#db/queries/users';
import { hashPassword } from '#lib/auth/passwords';
import { inTransaction } from '#db/queries/connection';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { resolveInvitationMail, resolveResetMail } from '#lib/services/people/linkMails';
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

export interface Delivered {
  to: string;
  subject: string;
  text: string;
}

/** Sends what waits in the outbox, and answers it. */
export async function deliverMails(): Promise<Delivered[]> {
  const delivered: Delivered[] = [];
  const sendMail = async ({
    to,
    subject,
    text,
  }: {
    to: { address: string };
    subject: string;
    text: string;
  }) => {
    delivered.push({ to: to.address, subject, text });
  };
  const settings = {
    transport: { sendMail } as never,
    from: 'Bittern <bittern@merrow.example>',
    holder: 'test',
    resolvers: { invitation: resolveInvitationMail, 'password-reset': resolveResetMail },
  };
  while ((await sendDueMail(settings, new Date())) > 0);
  return delivered;
}

/** The token of the link in a message: what follows `/join/` or `/reset/`. */
export function tokenIn(mail: Delivered | undefined): string {
  return /\/(?:join|reset)\/([\w-]+)/.exec(mail?.text ?? '')?.[1] ?? '';
}
