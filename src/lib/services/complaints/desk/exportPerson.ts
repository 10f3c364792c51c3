import { appendAudit } from '#db/queries/audit';
import { findComplaint } from '#db/queries/complaints';
import { readDeskSettings } from '#db/queries/complaintSettings';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import { findReportForm } from '#db/queries/reports';
import type { HeldComplaint, PersonalExport } from '#lib/contracts/personalExport';
import { openPersonalData } from '../readPersonalData';
import { contactDigests } from './contactDigests';
import { heldData } from './heldData';
import { complaintsOfPerson } from './personHistory';

/**
 * All that a network holds about the person of a complaint, for a data request: the complaint and every other one of the same contact.
 * Taking it out is in the audit trail of each complaint. `erased`: nothing is held any more.
 */
export async function exportPerson(
  userId: string,
  network: NetworkRow,
  reference: string,
  now: Date,
): Promise<PersonalExport | 'unknown' | 'erased'> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return 'unknown';
  return inTransaction(async (transaction) => {
    const person = await openPersonalData(complaint.id, transaction);
    if (!person) return 'erased';
    const complaints: HeldComplaint[] = [];
    for (const row of await complaintsOfPerson(complaint, person, transaction)) {
      const held = await heldData(row, transaction);
      if (held) complaints.push(held);
    }
    for (const held of complaints) {
      await appendAudit(
        {
          userId,
          networkId: network.id,
          action: 'complaint.personal-data-export',
          subject: `complaint ${held.reference}`,
          detail: { askedFor: reference },
        },
        transaction,
      );
    }
    const { retentionMonths } = await readDeskSettings(network.id, transaction);
    const form = await findReportForm(network.id, transaction);
    return {
      network: network.name,
      keeper: form?.keeper ?? network.name,
      madeAt: now.toISOString(),
      keptUntil: `${retentionMonths} months after a complaint has ended, or until its erasure is asked for`,
      knownBy: contactDigests(network.id, person.contact).map(({ kind }) => kind),
      complaints,
    };
  });
}
