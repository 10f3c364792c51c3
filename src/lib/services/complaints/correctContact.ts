import { appendAudit } from '#db/queries/audit';
import { writeContactDigests } from '#db/queries/complaintContacts';
import { findSealedPerson, writeComplaintPrivate } from '#db/queries/complaintPrivate';
import { lockComplaint, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { Contact } from '#lib/contracts/complaints';
import { contactDigests } from './desk/contactDigests';
import { sealValue } from './personalData';
import { openPersonalData } from './readPersonalData';

/** Replaces the contact of a complaint; own words and place stay. Answers false once the personal data are erased. */
export async function correctContact(
  userId: string,
  complaint: ComplaintRow,
  contact: Contact,
): Promise<boolean> {
  return inTransaction(async (transaction) => {
    await lockComplaint(complaint.networkId, complaint.reference, transaction);
    const sealed = await findSealedPerson(complaint.id, transaction);
    const person = await openPersonalData(complaint.id, transaction);
    if (!sealed || !person) return false;
    const changed = Object.keys(contact).filter(
      (field) => contact[field as keyof Contact] !== person.contact[field as keyof Contact],
    );
    const ciphertext = sealValue(sealed.wrappedKey, complaint.id, 'person', { ...person, contact });
    await writeComplaintPrivate(complaint.id, ciphertext, transaction);
    await writeContactDigests(complaint, contactDigests(complaint.networkId, contact), transaction);
    await appendAudit(
      {
        userId,
        networkId: complaint.networkId,
        action: 'complaint.contact-correct',
        subject: `complaint ${complaint.reference}`,
        detail: { fields: changed },
      },
      transaction,
    );
    return true;
  });
}
