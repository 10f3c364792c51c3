import { appendAudit } from '#db/queries/audit';
import { findReplyMail, markPosted } from '#db/queries/complaintReplies';
import { findComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import { openLetter } from './replyMessage';
import { retryMail } from '../mails/outbox';
import type { Decision } from './answer/decideAnswer';

export interface DeliveringPerson {
  userId: string;
  network: NetworkRow;
  reference: string;
  replyId: number;
}

/** Notes that a letter on paper was posted on a date, or (null) that this was noted by mistake. */
export async function notePosted(
  { userId, network, reference, replyId }: DeliveringPerson,
  on: string | null,
): Promise<Decision> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return { kind: 'unknown' };
  if ((await findReplyMail(complaint.id, replyId)) !== undefined) {
    return { kind: 'refused', message: 'This answer goes by e-mail.' };
  }
  return inTransaction(async (transaction) => {
    const posted = on === null ? null : { by: userId, on };
    if (!(await markPosted(complaint.id, replyId, posted, transaction))) {
      return { kind: 'refused', message: 'Somebody noted that before.' };
    }
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: on === null ? 'complaint.reply-not-posted' : 'complaint.reply-posted',
        subject: `complaint ${reference}`,
        detail: { replyId, ...(on === null ? {} : { on }) },
      },
      transaction,
    );
    return { kind: 'done' };
  });
}

/** Has the e-mail of a reply tried again at once, under the same Message-ID. */
export async function resendReply(
  { userId, network, reference, replyId }: DeliveringPerson,
  now: Date,
): Promise<Decision> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return { kind: 'unknown' };
  const mailId = await findReplyMail(complaint.id, replyId);
  if (mailId === undefined) return { kind: 'refused', message: 'This answer is a letter on paper.' };
  const outcome = await retryMail({ networkId: network.id, userId }, mailId, now);
  if (outcome.kind === 'done') return { kind: 'done' };
  return { kind: 'refused', message: 'Nothing waits to be sent again: the mail server has it already.' };
}

/** The PDF of a reply of a complaint as it was sent; that somebody took it is audited. Null where there is none. */
export async function letterOf({
  userId,
  network,
  reference,
  replyId,
}: DeliveringPerson): Promise<Buffer | null> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return null;
  return inTransaction(async (transaction) => {
    const bytes = await openLetter(replyId, complaint.id);
    if (!bytes) return null;
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint.personal-data-read',
        subject: `complaint ${reference}`,
        detail: { fields: ['letters'], replyId },
      },
      transaction,
    );
    return bytes;
  });
}
