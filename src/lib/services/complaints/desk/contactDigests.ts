import { listWithoutDigests, writeContactDigests, type ContactDigest } from '#db/queries/complaintContacts';
import { inTransaction } from '#db/queries/connection';
import type { Contact } from '#lib/contracts/complaints';
import { purposeMac } from '../../purposeMac';
import { openPersonalData } from '../readPersonalData';

/** Digits of a number that are compared: with and without a country's code it is the same one. */
const COMPARED_DIGITS = 9;
const LEAST_DIGITS = 6;

/**
 * Keyed digests by which complaints of the same person are found without reading anybody's data: of the e-mail address in lower case,
 * and of the last nine digits of the phone number. In another network the same person has others.
 */
export function contactDigests(networkId: number, { email, phone }: Contact): ContactDigest[] {
  const digits = (phone ?? '').replace(/\D/g, '').slice(-COMPARED_DIGITS);
  return [
    ...(email ? [digestOf(networkId, 'email', email.trim().toLowerCase())] : []),
    ...(digits.length >= LEAST_DIGITS ? [digestOf(networkId, 'phone', digits)] : []),
  ];
}

function digestOf(networkId: number, kind: ContactDigest['kind'], text: string): ContactDigest {
  return { kind, digest: purposeMac('complaint contact', `${networkId} ${kind} ${text}`) };
}

/** Gives complaints that were logged before there were digests theirs. @returns how many were looked at, at most `limit`. */
export async function digestOlderContacts(limit: number): Promise<number> {
  const complaints = await listWithoutDigests(limit);
  for (const complaint of complaints) {
    await inTransaction(async (transaction) => {
      const person = await openPersonalData(complaint.id, transaction);
      const digests = person ? contactDigests(complaint.networkId, person.contact) : [];
      await writeContactDigests(complaint, digests, transaction);
    });
  }
  return complaints.length;
}
