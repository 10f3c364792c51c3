import { listReplies } from '#db/queries/complaintReplies';
import { findComplaint } from '#db/queries/complaints';
import { pool } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import type { NewReply, Reply } from '#lib/contracts/complaints';
import { gatherEvidence } from './evidence';
import { openPersonalData } from './readPersonalData';
import { sendReply, type Unsent } from './sendReply';
import { replyView } from './view';

export type AnswerOutcome = { kind: 'sent'; reply: Reply } | { kind: 'unknown' } | Unsent;

/** Sends a reply on the figures as they stand now, which are gathered anew and must be those that its writer saw. */
export async function answerCase(
  userId: string,
  network: NetworkRow,
  reference: string,
  reply: NewReply,
  now: Date,
): Promise<AnswerOutcome> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return { kind: 'unknown' };
  const person = await openPersonalData(complaint.id, pool());
  const nowSec = Math.floor(now.getTime() / 1000);
  const { evidence } = await gatherEvidence({ network, complaint, place: person?.place ?? null, nowSec });
  const outcome = await sendReply(userId, complaint, reply, evidence);
  if (outcome.kind !== 'sent') return outcome;
  const kept = (await listReplies(complaint.id)).find(({ id }) => id === outcome.replyId);
  if (!kept) throw new Error(`Reply ${outcome.replyId} is not there although it was kept.`);
  return { kind: 'sent', reply: replyView(kept) };
}

/** Why a reply was not sent and what to do about it, in plain words. */
export const UNSENT_REASONS: Readonly<Record<Unsent['kind'], string>> = {
  'figures-changed':
    'The figures have changed since the letter was drafted (late data or an exclusion). Nothing was sent: compare the text ' +
    'with the new figures.',
  'answered-meanwhile': 'Another reply went out meanwhile. Nothing was sent: read that one first.',
  closed: 'This complaint is closed. Nothing was sent.',
  erased: 'The personal data have been erased: there is nobody to write to.',
};
