import { createHash } from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { endAnswer, findOpenAnswer } from '#db/queries/complaintAnswers';
import { insertLetter } from '#db/queries/complaintLetters';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { countReplies, insertReply, queueReplyMail } from '#db/queries/complaintReplies';
import { lockComplaint, markAnswered, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { EvidencePack, PackItem } from '#lib/contracts/evidencePack';
import { sealFile, sealValue } from './personalData';
import { openPersonalData } from './readPersonalData';
import type { ReplyContent } from './replyMessage';

/** Why nothing was sent. */
export type Unsent =
  /** The figures are no longer those that the text was written from: late data, an exclusion. */
  | { kind: 'figures-changed' }
  /** Another reply went out meanwhile, or the answer was changed or taken back. */
  | { kind: 'answered-meanwhile' }
  /** The network wants a second person to approve it. */
  | { kind: 'approval-needed' }
  /** The text has what a letter may not have, or lacks what it must say. */
  | { kind: 'text-refused'; problems: string[] }
  | { kind: 'closed' }
  | { kind: 'erased' };

export type SendOutcome = { kind: 'sent'; replyId: number } | Unsent;

/** A letter that is ready to go. */
export interface ReadyLetter {
  text: string;
  pdf: Buffer;
  pack: EvidencePack;
  items: readonly PackItem[];
  /** Where an answer goes; null: to the sender. */
  replyTo: string | null;
  /** Who wrote it, and the second person where one approved it. */
  sentBy: string;
  approvedBy: string | null;
  /** The kept answer that it was made from, at that revision; null: written at once. */
  answer: { id: number; revision: number } | null;
  /** How many replies its writer knew of; null: not asked. */
  repliesSoFar: number | null;
}

/**
 * Keeps a reply with the figures that it carries and its PDF and, in the same transaction, puts its e-mail into the outbox and marks the
 * complaint answered. Recipient and text rest sealed: neither the outbox row nor its subject names a person. Without an e-mail
 * address the reply is kept as a letter to print and post. `userId`: whose act it is.
 */
export async function sendReply(
  userId: string,
  complaint: ComplaintRow,
  letter: ReadyLetter,
): Promise<SendOutcome> {
  return inTransaction(async (transaction) => {
    const current = await lockComplaint(complaint.networkId, complaint.reference, transaction);
    if (await isOvertaken(complaint.id, letter, transaction)) return { kind: 'answered-meanwhile' };
    const sealed = await findSealedPerson(complaint.id, transaction);
    const person = await openPersonalData(complaint.id, transaction);
    if (!sealed || !person) return { kind: 'erased' };
    if (current?.status === 'closed') return { kind: 'closed' };

    const at = new Date();
    const { pack, items, sentBy, approvedBy } = letter;
    const content: ReplyContent = {
      to: person.contact.email,
      subject: replySubject(complaint.reference),
      text: letter.text,
      replyTo: letter.replyTo,
      pack,
    };
    const ciphertext = sealValue(sealed.wrappedKey, complaint.id, 'reply', content);
    const replyId = await insertReply(
      { complaintId: complaint.id, ciphertext, figures: pack.evidence, items, sentBy, approvedBy, at },
      transaction,
    );
    await insertLetter(
      {
        replyId,
        complaintId: complaint.id,
        ciphertext: sealFile(sealed.wrappedKey, complaint.id, letter.pdf, 'letter'),
        byteCount: letter.pdf.length,
        sha256: createHash('sha256').update(letter.pdf).digest(),
      },
      transaction,
    );
    const delivery = content.to === null ? 'letter' : 'email';
    if (delivery === 'email') {
      const { networkId, reference } = complaint;
      await queueReplyMail({ replyId, networkId, reference, subject: content.subject, at }, transaction);
    }
    if (letter.answer) {
      await endAnswer(letter.answer.id, { state: 'sent', replyId, decidedBy: approvedBy }, transaction);
    }
    await markAnswered(complaint.id, at, transaction);
    await appendAudit(
      {
        userId,
        networkId: complaint.networkId,
        action: 'complaint.reply',
        subject: `complaint ${complaint.reference}`,
        detail: {
          replyId,
          delivery,
          figuresDigest: pack.evidence.digest,
          items,
          ...(approvedBy === null ? {} : { writtenBy: sentBy }),
          personal: ['text', 'recipient'],
        },
      },
      transaction,
    );
    return { kind: 'sent', replyId };
  });
}

async function isOvertaken(
  complaintId: number,
  { answer, repliesSoFar }: ReadyLetter,
  transaction: Connection,
): Promise<boolean> {
  if (repliesSoFar !== null && repliesSoFar !== (await countReplies(complaintId, transaction))) return true;
  if (!answer) return false;
  const kept = await findOpenAnswer(complaintId, transaction);
  return kept?.id !== answer.id || kept.revision !== answer.revision;
}

/** Subject of a reply: the reference and nothing personal, because it stands open in the outbox. */
function replySubject(reference: string): string {
  return `Your noise report ${reference}`;
}
