import { readAnsweringSettings } from '#db/queries/answeringSettings';
import { listReplies } from '#db/queries/complaintReplies';
import { findComplaint } from '#db/queries/complaints';
import { pool } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import { findUserById } from '#db/queries/users';
import type { NewReply, Reply } from '#lib/contracts/complaints';
import { USUAL_ITEMS } from './answer/items';
import { letterText, pdfOf, replyAddressOf } from './answer/makeLetter';
import { findElsewhere } from './pack/findElsewhere';
import { gatherPack } from './pack/gatherPack';
import { openPersonalData } from './readPersonalData';
import { sendReply, type Unsent } from './sendReply';
import { replyView } from './view';

export type AnswerOutcome = { kind: 'sent'; reply: Reply } | { kind: 'unknown' } | Unsent;

/**
 * Sends a reply on the figures as they stand now, which are gathered anew and must be those that its writer saw. Its text may have
 * fields, and has no levels but by fields.
 */
export async function answerCase(
  userId: string,
  network: NetworkRow,
  reference: string,
  reply: NewReply,
  now: Date,
): Promise<AnswerOutcome> {
  const complaint = await findComplaint(network.id, reference);
  if (!complaint) return { kind: 'unknown' };
  if ((await readAnsweringSettings(network.id)).needsApproval) return { kind: 'approval-needed' };
  const [person, user] = await Promise.all([openPersonalData(complaint.id, pool()), findUserById(userId)]);
  if (!person) return { kind: 'erased' };
  const nowSec = Math.floor(now.getTime() / 1000);
  const gathered = await gatherPack({ network, complaint, place: person.place, nowSec });
  if (reply.figuresDigest !== null && reply.figuresDigest !== gathered.evidence.digest)
    return { kind: 'figures-changed' };
  const items = reply.items ?? [...USUAL_ITEMS];
  const pack = { ...gathered, elsewhere: await findElsewhere(complaint, items, nowSec) };
  const source = { network, complaint, person, body: reply.text, items, pack, signedBy: user?.name ?? '' };
  const letter = letterText(source);
  if (!letter.isReady) return { kind: 'text-refused', problems: letter.problems };
  const outcome = await sendReply(userId, complaint, {
    text: letter.text,
    pdf: await pdfOf(source, letter.text, now),
    pack,
    items,
    replyTo: await replyAddressOf(network, reference),
    sentBy: userId,
    approvedBy: null,
    answer: null,
    repliesSoFar: reply.repliesSoFar,
  });
  if (outcome.kind !== 'sent') return outcome;
  const kept = (await listReplies(complaint.id)).find(({ id }) => id === outcome.replyId);
  if (!kept) throw new Error(`Reply ${outcome.replyId} is not there although it was kept.`);
  return { kind: 'sent', reply: replyView(kept) };
}

/** Why a reply was not sent and what to do about it, in plain words. */
export function unsentReason(unsent: Unsent): string {
  switch (unsent.kind) {
    case 'figures-changed':
      return (
        'The figures have changed since the letter was drafted (late data or an exclusion). Nothing was sent: compare the text ' +
        'with the new figures.'
      );
    case 'answered-meanwhile':
      return 'Another answer went out, or somebody changed this one meanwhile. Nothing was sent: read that first.';
    case 'approval-needed':
      return 'In this network a second person approves an answer. Nothing was sent: submit it on the page of the answer.';
    case 'text-refused':
      return `Nothing was sent: the letter ${unsent.problems.join('; it ')}.`;
    case 'closed':
      return 'This complaint is closed. Nothing was sent.';
    case 'erased':
      return 'The personal data have been erased: there is nobody to write to.';
  }
}
