import { randomBytes } from 'node:crypto';
import { countAccountTokens, insertAccountToken } from '#db/queries/accountTokens';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, pool } from '#db/queries/connection';
import { findOpenInvitationByEmail } from '#db/queries/invitations';
import { deleteMail } from '#db/queries/outbox';
import { findCredentials, findUserById } from '#db/queries/users';
import { config } from '#lib/config/index';
import { formatInstant } from '#lib/format/times';
import { noteHtml, noteText, type Note } from '../mails/note';

const RESET_MINUTES = 60;
/** Whoever asks in somebody else's name fills no mailbox. */
const MOST_RESETS_AN_HOUR = 5;
const HOUR_MS = 3_600_000;

interface HeldMail {
  id: number;
  recipient: string | null;
  /** How often sending it failed. */
  attempts: number;
}

interface LinkMail {
  to: string;
  subject: string;
  text: string;
  html: string;
}

/**
 * Makes the link of a password reset at sending, to the address as it is stored: what was typed may only look like it. Where the
 * address is nobody's the message is forgotten; whoever asked cannot tell, as asking is the same for every address.
 */
export async function resolveResetMail(
  { id, recipient, attempts }: HeldMail,
  now = new Date(),
): Promise<LinkMail | null> {
  const secret = newSecret();
  const email = await inTransaction(async (transaction) => {
    const user = (await findCredentials(recipient ?? '', transaction))?.user;
    if (!user || user.disabledAt) return null;
    const since = new Date(now.getTime() - HOUR_MS);
    const soFar = await countAccountTokens('password-reset', user.id, since, transaction);
    if (attempts === 0 && soFar >= MOST_RESETS_AN_HOUR) return null;
    const expiresAt = new Date(now.getTime() + RESET_MINUTES * 60_000);
    const token = { secret, purpose: 'password-reset', subject: user.id, createdAt: now, expiresAt } as const;
    await insertAccountToken(token, transaction);
    const subject = `person ${user.id}`;
    await appendAudit(
      { userId: null, networkId: null, action: 'person.password-link', subject, detail: {} },
      transaction,
    );
    return user.email;
  });
  return email === null ? forget(id) : mailOf(email, resetNote(secret));
}

/** Makes the link of an invitation at sending; one that was withdrawn or accepted meanwhile is not sent. */
export async function resolveInvitationMail(
  { id, recipient }: HeldMail,
  now = new Date(),
): Promise<LinkMail | null> {
  const secret = newSecret();
  const mail = await inTransaction(async (transaction) => {
    const invitation = await findOpenInvitationByEmail(recipient ?? '', transaction);
    if (!invitation || invitation.expiresAt <= now) return null;
    const { id: invitationId, email, name, expiresAt, createdBy } = invitation;
    const token = { secret, purpose: 'invitation', subject: String(invitationId) } as const;
    await insertAccountToken({ ...token, createdAt: now, expiresAt }, transaction);
    const inviter = await findUserById(createdBy, transaction);
    return mailOf(email, invitationNote(secret, { name, inviter: inviter?.name, expiresAt }));
  });
  return mail ?? forget(id);
}

async function forget(id: number): Promise<null> {
  await deleteMail(id, pool());
  return null;
}

const newSecret = () => randomBytes(32).toString('base64url');

function mailOf(to: string, note: Note): LinkMail {
  const subject = note.subject.replace(/\s+/g, ' ').trim();
  return { to, subject, text: noteText(note), html: noteHtml(note) };
}

function resetNote(secret: string): Note {
  return {
    subject: 'A new password for Bittern',
    opening: 'Somebody, probably you, asked for a new password for your account.',
    facts: [['Holds for', `${RESET_MINUTES} minutes, once`]],
    link: { label: 'Choose a new password', url: `${config().origin}/reset/${secret}` },
    closing: 'If you did not ask, leave this message alone: your password stays as it is.',
  };
}

function invitationNote(
  secret: string,
  { name, inviter, expiresAt }: { name: string; inviter: string | undefined; expiresAt: Date },
): Note {
  return {
    subject: 'Your invitation to Bittern',
    opening: `${name}, ${inviter ?? 'an administrator'} invites you to work with Bittern, which runs a noise-monitoring network. Choose a password, and you are in.`,
    facts: [['Holds until', `${formatInstant(Math.floor(expiresAt.getTime() / 1000), 'UTC')} UTC`]],
    link: { label: 'Accept the invitation', url: `${config().origin}/join/${secret}` },
    closing: 'If you do not expect this, leave the message alone: without you nothing comes of it.',
  };
}
