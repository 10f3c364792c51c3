import { appendAudit } from '#db/queries/audit';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { lockComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import { insertAddition, reopenComplaint } from '#db/queries/reports';
import { MOST_ADDITION_CHARACTERS, type ReportFaults } from '#lib/contracts/reports';
import { localDateAt } from '#lib/time/zone';
import { erasePersonalData } from '../complaints/closeComplaint';
import { answerDueOn } from '../complaints/dueDate';
import { sealValue } from '../complaints/personalData';
import { findByKey } from './followReport';
import type { PublicNetwork } from './openForm';
import { countSent, maySend } from './sendingBounds';

/** What an act on the private page came to; `unknown`: the key opens nothing. */
export type ActOutcome = { kind: 'done' } | { kind: 'unknown' } | { kind: 'refused'; faults: ReportFaults };

/**
 * Adds to a report in the resident's own words. An answered complaint waits for an answer again, by a new date; a closed or
 * erased one takes no more.
 */
export async function addToReport(
  place: PublicNetwork,
  key: string,
  { text, address, now }: { text: string; address: string; now: Date },
): Promise<ActOutcome> {
  const found = await findByKey(place, key);
  if (!found) return { kind: 'unknown' };
  const words = text.replaceAll('\r\n', '\n').trim();
  if (words === '') return refused('addition', 'write-something');
  if (words.length > MOST_ADDITION_CHARACTERS) return refused('addition', 'too-long-text');
  const { network, settings } = place;
  const sender = { networkId: network.id, address };
  const may = await maySend(sender, now);
  if (may !== 'yes') return refused('addition', may);
  const { complaint } = found;
  const today = localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone);
  return inTransaction(async (transaction) => {
    const current = await lockComplaint(network.id, complaint.reference, transaction);
    const sealed = await findSealedPerson(complaint.id, transaction);
    if (!sealed || current?.status === 'closed') return refused('addition', 'closed');
    const ciphertext = sealValue(sealed.wrappedKey, complaint.id, 'addition', words);
    await insertAddition(complaint.id, ciphertext, transaction);
    await reopenComplaint(complaint.id, await answerDueOn(network.id, today, transaction), transaction);
    await countSent(sender, now, transaction);
    await appendAudit(
      {
        userId: null,
        networkId: network.id,
        action: 'complaint.report-add',
        subject: `complaint ${complaint.reference}`,
        detail: { personal: ['addition'] },
      },
      transaction,
    );
    return { kind: 'done' };
  });
}

/** Erases what a report says about a person, for good, when the resident has confirmed it. */
export async function eraseReport(place: PublicNetwork, key: string, isSure: boolean): Promise<ActOutcome> {
  const found = await findByKey(place, key);
  if (!found) return { kind: 'unknown' };
  if (!isSure) return refused('erase', 'confirm-erase');
  await erasePersonalData({ by: 'resident' }, found.complaint);
  return { kind: 'done' };
}

function refused(field: 'addition' | 'erase', fault: ReportFaults['addition']): ActOutcome {
  return { kind: 'refused', faults: { [field]: fault } };
}
