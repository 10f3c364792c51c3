import { randomUUID } from 'node:crypto';
import { deleteAccountTokens, findAccountToken } from '#db/queries/accountTokens';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  closeInvitation,
  findOpenInvitation,
  findOpenInvitationByEmail,
  insertInvitation,
  listOpenInvitations,
  noteInvitationMail,
  type InvitationRow,
} from '#db/queries/invitations';
import { findCredentials, insertUser, listUsers } from '#db/queries/users';
import { type InvitationEntry, type NewInvitation } from '#lib/contracts/invitations';
import { isDuplicateKey } from '../duplicateKey';
import { putLinkMail } from './accountMail';
import { setRoles } from './memberships';

const HOLDS_MS = 7 * 86_400_000;
/** Who was written to so often knows. */
const MOST_MAILS = 20;

export type Inviting = { outcome: 'invited'; id: number } | { outcome: 'email-taken' | 'invited-already' };
export type Accepting =
  { outcome: 'joined'; userId: string } | { outcome: 'over' } | { outcome: 'email-taken' };

/** Asks somebody by e-mail to join, with what he or she will be. */
export function invite(input: NewInvitation, byUserId: string, now = new Date()): Promise<Inviting> {
  return inTransaction(async (transaction) => {
    if (await findCredentials(input.email, transaction)) return { outcome: 'email-taken' };
    if (await findOpenInvitationByEmail(input.email, transaction)) return { outcome: 'invited-already' };
    const expiresAt = new Date(now.getTime() + HOLDS_MS);
    const id = await insertInvitation(
      { ...input, createdBy: byUserId, createdAt: now, expiresAt },
      transaction,
    );
    await mailIt({ id, email: input.email }, now, transaction);
    const { isAdministrator, roles } = input;
    await audit(byUserId, 'invitation.make', id, { isAdministrator, roles }, transaction);
    return { outcome: 'invited', id };
  });
}

/** Invitations neither accepted nor withdrawn, latest first. */
export async function openInvitations(): Promise<InvitationEntry[]> {
  const [rows, users] = await Promise.all([listOpenInvitations(), listUsers()]);
  return rows.map(({ id, email, name, isAdministrator, roles, ...row }) => ({
    id,
    email,
    name,
    isAdministrator,
    roles,
    invitedBy: users.find((user) => user.id === row.createdBy)?.name ?? null,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    lastMailAt: row.lastMailAt?.toISOString() ?? null,
  }));
}

/** Sends an invitation again: it holds anew, and earlier links open nothing any more. */
export function sendInvitationAgain(
  id: number,
  byUserId: string,
  now = new Date(),
): Promise<'sent' | 'unknown' | 'too-often'> {
  return inTransaction(async (transaction) => {
    const invitation = await findOpenInvitation(id, transaction);
    if (!invitation) return 'unknown';
    if (invitation.mails >= MOST_MAILS) return 'too-often';
    await deleteAccountTokens('invitation', String(id), transaction);
    await mailIt(invitation, now, transaction);
    await audit(byUserId, 'invitation.resend', id, {}, transaction);
    return 'sent';
  });
}

/** Takes an invitation back: its links open nothing any more. Answers whether there was one. */
export function withdrawInvitation(id: number, byUserId: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    if (!(await findOpenInvitation(id, transaction))) return false;
    await deleteAccountTokens('invitation', String(id), transaction);
    await closeInvitation(id, 'withdrawn_at', new Date(), transaction);
    await audit(byUserId, 'invitation.withdraw', id, {}, transaction);
    return true;
  });
}

/** The invitation that a link names, while it holds. */
export function findInvitationOfLink(secret: string): Promise<InvitationRow | undefined> {
  return inTransaction((transaction) => ofLink(secret, new Date(), transaction));
}

/** Makes the person that the link's invitation describes, once. */
export async function acceptInvitation(secret: string, passwordHash: string): Promise<Accepting> {
  const userId = randomUUID();
  try {
    return await inTransaction(async (transaction) => {
      const now = new Date();
      const invitation = await ofLink(secret, now, transaction);
      if (!invitation) return { outcome: 'over' };
      const { id, email, name, isAdministrator, roles } = invitation;
      await insertUser({ id: userId, email, name, passwordHash, isAdministrator }, transaction);
      await setRoles(userId, roles, transaction);
      await deleteAccountTokens('invitation', String(id), transaction);
      await closeInvitation(id, 'accepted_at', now, transaction);
      const detail = { person: userId, isAdministrator, roles };
      await audit(userId, 'invitation.accept', id, detail, transaction);
      return { outcome: 'joined', userId };
    });
  } catch (error) {
    if (isDuplicateKey(error)) return { outcome: 'email-taken' };
    throw error;
  }
}

async function ofLink(
  secret: string,
  now: Date,
  transaction: Connection,
): Promise<InvitationRow | undefined> {
  const subject = await findAccountToken(secret, 'invitation', now, transaction);
  return subject === undefined ? undefined : findOpenInvitation(Number(subject), transaction);
}

async function mailIt(
  { id, email }: Pick<InvitationRow, 'id' | 'email'>,
  now: Date,
  transaction: Connection,
): Promise<void> {
  await noteInvitationMail(id, { at: now, expiresAt: new Date(now.getTime() + HOLDS_MS) }, transaction);
  await putLinkMail('invitation', email, transaction);
}

function audit(
  userId: string,
  action: string,
  id: number,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<void> {
  return appendAudit({ userId, networkId: null, action, subject: `invitation ${id}`, detail }, transaction);
}
