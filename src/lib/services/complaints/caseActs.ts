import { findComplaint } from '#db/queries/complaints';
import type { NetworkRow } from '#db/queries/networks';
import type { ClosingReason, Contact } from '#lib/contracts/complaints';
import { closeComplaint, erasePersonalData } from './closeComplaint';
import { correctContact } from './correctContact';

/** Closes an open complaint of a network without a reply. */
export async function closeByReference(
  userId: string,
  network: NetworkRow,
  reference: string,
  reason: Exclude<ClosingReason, 'erased'>,
): Promise<'done' | 'unknown' | 'not-open'> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return 'unknown';
  return (await closeComplaint(userId, complaint, reason)) ? 'done' : 'not-open';
}

/** Replaces the contact of a complaint of a network. */
export async function correctByReference(
  userId: string,
  network: NetworkRow,
  reference: string,
  contact: Contact,
): Promise<'done' | 'unknown' | 'erased'> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return 'unknown';
  return (await correctContact(userId, complaint, contact)) ? 'done' : 'erased';
}

/** Erases the personal data of a complaint of a network, for good. */
export async function eraseByReference(
  userId: string,
  network: NetworkRow,
  reference: string,
): Promise<'done' | 'unknown'> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return 'unknown';
  await erasePersonalData(userId, complaint);
  return 'done';
}
