import { appendAudit } from '#db/queries/audit';
import { listComplaintsOfContact } from '#db/queries/complaintContacts';
import { findComplaint, listComplaintsById, type ComplaintRow } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import type { Complaint, PersonalData } from '#lib/contracts/complaints';
import { localDateAt } from '#lib/time/zone';
import { openPersonalData } from '../readPersonalData';
import { complaintView } from '../view';
import { contactDigests } from './contactDigests';

/** A person and every complaint of theirs, latest noise first. */
export interface PersonHistory {
  person: PersonalData;
  complaints: Complaint[];
  /** By what complaints are known to be of the same person. */
  knownBy: ('email' | 'phone')[];
}

/**
 * Complaints of the same person as one complaint: those with the same e-mail address or phone number, found by keyed digests, so that
 * nobody's data are looked through. The look at the person is audited. `erased`: nobody is left to look for.
 */
export async function personHistory(
  userId: string,
  network: NetworkRow,
  settings: NetworkSettings,
  reference: string,
  now: Date,
): Promise<PersonHistory | 'unknown' | 'erased'> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return 'unknown';
  return inTransaction(async (transaction) => {
    const person = await openPersonalData(complaint.id, transaction);
    if (!person) return 'erased';
    const rows = await complaintsOfPerson(complaint, person, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint.personal-data-read',
        subject: `complaint ${reference}`,
        detail: { fields: ['history'], complaints: rows.length },
      },
      transaction,
    );
    const today = localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone);
    return {
      person,
      complaints: rows.map((row) => complaintView(row, today)),
      knownBy: contactDigests(network.id, person.contact).map(({ kind }) => kind),
    };
  });
}

/** Rows of the complaints that share an address or a number with one, itself among them. */
export async function complaintsOfPerson(
  { id, networkId }: Pick<ComplaintRow, 'id' | 'networkId'>,
  { contact }: PersonalData,
  conn: Connection,
): Promise<ComplaintRow[]> {
  const alike = await listComplaintsOfContact(networkId, contactDigests(networkId, contact), conn);
  return listComplaintsById(networkId, [...new Set([id, ...alike])], conn);
}
