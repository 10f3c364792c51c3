import { appendAudit } from '#db/queries/audit';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { countReplies, insertReply, queueReplyMail } from '#db/queries/complaintReplies';
import { lockComplaint, markAnswered, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import type { NewReply } from '#lib/contracts/complaints';
import { sealValue } from './personalData';
import { openPersonalData } from './readPersonalData';
import type { ReplyContent } from './replyMessage';

/** Why nothing was sent. */
export type Unsent =
  /** The figures are no longer those that the text was written from: late data, an exclusion. */
  | { kind: 'figures-changed' }
  /** Another reply went out meanwhile. */
  | { kind: 'answered-meanwhile' }
  | { kind: 'closed' }
  | { kind: 'erased' };

export type SendOutcome = { kind: 'sent'; replyId: number } | Unsent;

/**
 * Keeps a reply with the figures that it carries and, in the same transaction, puts its e-mail into the outbox and marks the
 * complaint answered. Recipient and text rest sealed: neither the outbox row nor its subject names a person. Without an e-mail
 * address the reply is kept as a letter to print and post.
 */
export async function sendReply(
  userId: string,
  complaint: ComplaintRow,
  reply: NewReply,
  evidence: Evidence,
): Promise<SendOutcome> {
  if (reply.figuresDigest !== null && reply.figuresDigest !== evidence.digest)
    return { kind: 'figures-changed' };
  return inTransaction(async (transaction) => {
    const current = await lockComplaint(complaint.networkId, complaint.reference, transaction);
    const repliesSoFar = await countReplies(complaint.id, transaction);
    if (reply.repliesSoFar !== null && reply.repliesSoFar !== repliesSoFar)
      return { kind: 'answered-meanwhile' };
    const sealed = await findSealedPerson(complaint.id, transaction);
    const person = await openPersonalData(complaint.id, transaction);
    if (!sealed || !person) return { kind: 'erased' };
    if (current?.status === 'closed') return { kind: 'closed' };

    const at = new Date();
    const content: ReplyContent = {
      to: person.contact.email,
      subject: replySubject(complaint.reference),
      text: reply.text,
    };
    const ciphertext = sealValue(sealed.wrappedKey, complaint.id, 'reply', content);
    const replyId = await insertReply(
      { complaintId: complaint.id, ciphertext, figures: evidence, sentBy: userId, at },
      transaction,
    );
    const delivery = content.to === null ? 'letter' : 'email';
    if (delivery === 'email') {
      await queueReplyMail(
        { replyId, networkId: complaint.networkId, subject: content.subject, at },
        transaction,
      );
    }
    await markAnswered(complaint.id, at, transaction);
    await appendAudit(
      {
        userId,
        networkId: complaint.networkId,
        action: 'complaint.reply',
        subject: `complaint ${complaint.reference}`,
        detail: { replyId, delivery, figuresDigest: evidence.digest, personal: ['text', 'recipient'] },
      },
      transaction,
    );
    return { kind: 'sent', replyId };
  });
}

/** Subject of a reply: the reference and nothing personal, because it stands open in the outbox. */
function replySubject(reference: string): string {
  return `Your noise report ${reference}`;
}
