import { createHash } from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { findSealedPerson } from '#db/queries/complaintPrivate';
import { insertReceived, withdrawReceived } from '#db/queries/complaintReceived';
import { lockComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import type { Decision } from '../answer/decideAnswer';
import { sealValue } from '../personalData';
import { readMessage, type ReceivedContent } from './readMessage';

const MOST_CHARACTERS = 20_000;
/** A message's own bytes: a letter with a picture or two. */
const MOST_MESSAGE_BYTES = 15 * 1024 * 1024;
/** A clock may be a little fast. */
const CLOCK_TOLERANCE_MS = 300_000;

export interface FilingPerson {
  userId: string;
  network: NetworkRow;
  reference: string;
}

/** Files an e-mail that a resident answered with (the bytes of its .eml) under the reference. */
export async function fileMessage(who: FilingPerson, bytes: Buffer): Promise<Decision> {
  if (bytes.length > MOST_MESSAGE_BYTES) return refused('The file is larger than 15 MiB. Nothing was filed.');
  const message = await readMessage(bytes);
  if (!message) return refused('This file could not be read as an e-mail. Nothing was filed.');
  const { named, content, at, messageId } = message;
  if (named.length > 0 && !named.includes(who.reference)) {
    return refused(`This message answers ${named.join(', ')}. Nothing was filed: file it there.`);
  }
  return file(who, 'message', content, at, messageId);
}

/** Files what a person notes of an answer that came another way: by phone, by post, at the door. */
export async function noteReceived(who: FilingPerson, text: string, at: Date, now: Date): Promise<Decision> {
  const trimmed = text.replaceAll('\r\n', '\n').trim();
  if (trimmed === '') return refused('The note was empty. Nothing was filed.');
  if (trimmed.length > MOST_CHARACTERS)
    return refused('A note has at most 20,000 characters. Nothing was filed.');
  if (Number.isNaN(at.getTime())) return refused('Say when it came. Nothing was filed.');
  if (at.getTime() > now.getTime() + CLOCK_TOLERANCE_MS) return refused('It cannot have come in the future.');
  return file(who, 'note', { from: null, subject: null, text: trimmed, attachments: 0 }, at, null);
}

/** Withdraws what was filed by mistake; what it said is destroyed. */
export async function withdrawFiled(
  { userId, network, reference }: FilingPerson,
  id: number,
): Promise<Decision> {
  return inTransaction(async (transaction) => {
    const complaint = await lockComplaint(network.id, reference, transaction);
    if (!complaint) return { kind: 'unknown' };
    if (!(await withdrawReceived(complaint.id, id, userId, transaction))) {
      return refused('It was withdrawn before.');
    }
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint.received-withdraw',
        subject: `complaint ${reference}`,
        detail: { id },
      },
      transaction,
    );
    return { kind: 'done' };
  });
}

async function file(
  { userId, network, reference }: FilingPerson,
  source: 'message' | 'note',
  content: ReceivedContent,
  receivedAt: Date,
  messageId: string | null,
): Promise<Decision> {
  return inTransaction(async (transaction) => {
    const complaint = await lockComplaint(network.id, reference, transaction);
    if (!complaint) return { kind: 'unknown' };
    const sealed = await findSealedPerson(complaint.id, transaction);
    if (!sealed) return refused('The personal data have been erased. Nothing was filed.');
    const id = await insertReceived(
      {
        complaintId: complaint.id,
        source,
        ciphertext: sealValue(sealed.wrappedKey, complaint.id, 'received', content),
        messageDigest: messageId === null ? null : createHash('sha256').update(messageId).digest(),
        receivedAt,
        filedBy: userId,
      },
      transaction,
    );
    if (id === null) return refused('This very message has been filed already.');
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint.received-file',
        subject: `complaint ${reference}`,
        detail: { id, source, personal: ['text', ...(content.from === null ? [] : ['sender'])] },
      },
      transaction,
    );
    return { kind: 'done' };
  });
}

function refused(message: string): Decision {
  return { kind: 'refused', message };
}
