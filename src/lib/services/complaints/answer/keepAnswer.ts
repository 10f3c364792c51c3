import { appendAudit } from '#db/queries/audit';
import { findOpenAnswer, insertAnswer, rewriteAnswer } from '#db/queries/complaintAnswers';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { findComplaint, lockComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import type { PackItem } from '#lib/contracts/evidencePack';
import { findElsewhere } from '../pack/findElsewhere';
import { sealAnswer } from './keptAnswer';

/** What a person keeps of an answer. */
export interface AnswerEntry {
  body: string;
  items: readonly PackItem[];
  templateVersionId: number | null;
  /** Revision that it was written on; 0: on none. */
  revision: number;
}

export type KeepOutcome =
  | { kind: 'kept'; revision: number }
  /** Somebody else kept another text meanwhile. */
  | { kind: 'changed-meanwhile' }
  /** It waits for a second person and is taken back first. */
  | { kind: 'submitted' }
  | { kind: 'closed' }
  | { kind: 'erased' }
  | { kind: 'unknown' };

/**
 * Keeps an answer that is being written, whether or not it may be sent as it is. Where the same spectrum on other dates was chosen, it is
 * looked for now, which takes some seconds.
 */
export async function keepAnswer(
  userId: string,
  network: NetworkRow,
  reference: string,
  entry: AnswerEntry,
): Promise<KeepOutcome> {
  const asked = await findComplaint(network.id, reference);
  if (!asked) return { kind: 'unknown' };
  const elsewhere = await findElsewhere(asked, entry.items, Math.floor(Date.now() / 1000));
  return inTransaction(async (transaction) => {
    const complaint = await lockComplaint(network.id, reference, transaction);
    if (!complaint) return { kind: 'unknown' };
    if (complaint.status === 'closed') return { kind: 'closed' };
    const sealed = await findSealedPerson(complaint.id, transaction);
    if (!sealed) return { kind: 'erased' };
    const before = await findOpenAnswer(complaint.id, transaction);
    if (before?.state === 'submitted') return { kind: 'submitted' };
    if ((before?.revision ?? 0) !== entry.revision) return { kind: 'changed-meanwhile' };
    const kept = {
      complaintId: complaint.id,
      ciphertext: sealAnswer(sealed.wrappedKey, complaint.id, { body: entry.body, elsewhere }),
      items: entry.items,
      templateVersionId: entry.templateVersionId,
      author: userId,
    };
    if (before) await rewriteAnswer(before.id, kept, transaction);
    else await insertAnswer(kept, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint.answer-keep',
        subject: `complaint ${reference}`,
        detail: { items: entry.items, personal: ['text'] },
      },
      transaction,
    );
    return { kind: 'kept', revision: (before?.revision ?? 0) + 1 };
  });
}
