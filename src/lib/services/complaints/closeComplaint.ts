import { appendAudit } from '#db/queries/audit';
import { destroyPersonalData } from '#db/queries/complaintPrivate';
import { giveUpReplyMails } from '#db/queries/complaintReplies';
import { lockComplaint, markClosed, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { ClosingReason } from '#lib/contracts/complaints';

/** Closes an open complaint without a reply. Answers false when it is no longer open. */
export async function closeComplaint(
  userId: string,
  complaint: ComplaintRow,
  reason: Exclude<ClosingReason, 'erased'>,
): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const current = await lockComplaint(complaint.networkId, complaint.reference, transaction);
    if (current?.status !== 'open') return false;
    await markClosed(complaint.id, reason, new Date(), transaction);
    await appendAudit(entryOf(userId, complaint, 'complaint.close', { reason }), transaction);
    return true;
  });
}

/**
 * Erases who complained, their words and exact place: the key and every ciphertext are destroyed, so no copy of the data
 * opens any more. What stays is the coarse record and the figures that replies carried. An open complaint is closed, since
 * nobody is left to answer; e-mails still waiting are given up. Without a user it is the resident who erases.
 */
export async function erasePersonalData(userId: string | null, complaint: ComplaintRow): Promise<void> {
  await inTransaction(async (transaction) => {
    const current = await lockComplaint(complaint.networkId, complaint.reference, transaction);
    await giveUpReplyMails(complaint.id, transaction);
    await destroyPersonalData(complaint.id, transaction);
    if (current?.status === 'open') await markClosed(complaint.id, 'erased', new Date(), transaction);
    await appendAudit(
      entryOf(userId, complaint, 'complaint.personal-data-erase', userId === null ? { by: 'resident' } : {}),
      transaction,
    );
  });
}

function entryOf(
  userId: string | null,
  complaint: ComplaintRow,
  action: string,
  detail: Record<string, unknown>,
) {
  return {
    userId,
    networkId: complaint.networkId,
    action,
    subject: `complaint ${complaint.reference}`,
    detail,
  };
}
