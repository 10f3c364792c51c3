import { appendAudit } from '#db/queries/audit';
import { destroyDeskData } from '#db/queries/complaintDesk';
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

/** Who has personal data erased: a person by id, the resident on the private page, or the end of the time for which they are kept. */
type Eraser = string | { by: 'resident' } | { by: 'retention'; months: number };

/**
 * Erases who complained, their words and exact place: the key and every ciphertext are destroyed, so no copy of the data
 * opens any more. What stays is the coarse record and the figures that replies carried. An open complaint is closed, since
 * nobody is left to answer; e-mails still waiting are given up.
 */
export async function erasePersonalData(
  by: Eraser,
  complaint: Pick<ComplaintRow, 'id' | 'networkId' | 'reference'>,
): Promise<void> {
  const userId = typeof by === 'string' ? by : null;
  await inTransaction(async (transaction) => {
    const current = await lockComplaint(complaint.networkId, complaint.reference, transaction);
    await giveUpReplyMails(complaint.id, transaction);
    await destroyPersonalData(complaint.id, transaction);
    await destroyDeskData(complaint.id, transaction);
    if (current?.status === 'open') await markClosed(complaint.id, 'erased', new Date(), transaction);
    await appendAudit(
      entryOf(userId, complaint, 'complaint.personal-data-erase', typeof by === 'string' ? {} : by),
      transaction,
    );
  });
}

function entryOf(
  userId: string | null,
  complaint: Pick<ComplaintRow, 'networkId' | 'reference'>,
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
