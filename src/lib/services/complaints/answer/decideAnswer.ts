import { appendAudit } from '#db/queries/audit';
import {
  endAnswer,
  findOpenAnswer,
  markReturned,
  markSubmitted,
  type AnswerRow,
} from '#db/queries/complaintAnswers';
import { lockComplaint } from '#db/queries/complaints';
import { inTransaction, type Connection } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import { unsentReason } from '../answerCase';
import { sendReply } from '../sendReply';
import { openAnswerDesk, type AnswerDesk } from './answerDesk';
import { pdfOf, replyAddressOf } from './makeLetter';

/** What came of an act; `refused` says why nothing was changed and what to do. */
export type Decision = { kind: 'done' } | { kind: 'unknown' } | { kind: 'refused'; message: string };

const GONE = 'This answer was changed, sent or thrown away meanwhile. Nothing was done: look at it first.';

/** Which answer an act is about: the one at this revision. */
export interface Act {
  userId: string;
  network: NetworkRow;
  reference: string;
  revision: number;
}

/** Submits an answer to a second person, with the figures as they stand now. */
export async function submitAnswer(act: Act, now: Date): Promise<Decision> {
  const desk = await openAnswerDesk(act.userId, act.network, act.reference, now);
  const refusal = refusalOf(desk);
  if (!desk || refusal) return refusal ?? { kind: 'unknown' };
  return onAnswer(act, 'draft', async (answer, transaction) => {
    await markSubmitted(answer.id, desk.pack.evidence.digest, transaction);
    return ['complaint.answer-submit', { figuresDigest: desk.pack.evidence.digest }];
  });
}

/** Takes a submitted answer back (its author), or gives it back to be written on (anybody else). */
export function returnAnswer(act: Act): Promise<Decision> {
  return onAnswer(act, 'submitted', async (answer, transaction) => {
    const isOwn = answer.author === act.userId;
    await markReturned(answer.id, isOwn ? null : act.userId, transaction);
    return [isOwn ? 'complaint.answer-take-back' : 'complaint.answer-give-back', {}];
  });
}

/** Throws away an answer that was not sent; what it said is destroyed. */
export function discardAnswer(act: Act): Promise<Decision> {
  return onAnswer(act, 'draft', async (answer, transaction) => {
    await endAnswer(answer.id, { state: 'withdrawn', replyId: null, decidedBy: null }, transaction);
    return ['complaint.answer-discard', {}];
  });
}

/** Approves a submitted answer and sends it. Its author cannot, and its figures must be those that were submitted. */
export async function approveAnswer(act: Act, now: Date): Promise<Decision> {
  const desk = await openAnswerDesk(act.userId, act.network, act.reference, now);
  const refusal = refusalOf(desk);
  if (!desk || refusal) return refusal ?? { kind: 'unknown' };
  if (desk.kept?.state !== 'submitted') return { kind: 'refused', message: GONE };
  if (desk.kept.author === act.userId) {
    return {
      kind: 'refused',
      message: 'Who wrote an answer cannot approve it. Another liaison or an administrator can.',
    };
  }
  if (desk.isOutdated) {
    return {
      kind: 'refused',
      message:
        'The figures have changed since it was submitted. Nothing was sent: give it back, so that its author looks at it.',
    };
  }
  return send(act, desk, { sentBy: desk.kept.author, approvedBy: act.userId, now });
}

/** Sends an answer at once, where the network wants no second person. `figuresDigest`: of the figures that were seen. */
export async function sendAnswer(act: Act, figuresDigest: string, now: Date): Promise<Decision> {
  const desk = await openAnswerDesk(act.userId, act.network, act.reference, now);
  const refusal = refusalOf(desk);
  if (!desk || refusal) return refusal ?? { kind: 'unknown' };
  if (desk.settings.needsApproval)
    return { kind: 'refused', message: unsentReason({ kind: 'approval-needed' }) };
  if (desk.kept?.state !== 'draft') return { kind: 'refused', message: GONE };
  if (figuresDigest !== desk.pack.evidence.digest) {
    return { kind: 'refused', message: unsentReason({ kind: 'figures-changed' }) };
  }
  return send(act, desk, { sentBy: desk.kept.author, approvedBy: null, now });
}

/** Why a letter cannot go as it stands; null: it can, or there is none. */
function refusalOf(desk: AnswerDesk | null | undefined): Decision | null {
  if (desk === undefined) return null;
  if (desk === null) return { kind: 'refused', message: unsentReason({ kind: 'erased' }) };
  if (desk.letter.isReady) return null;
  return { kind: 'refused', message: unsentReason({ kind: 'text-refused', problems: desk.letter.problems }) };
}

async function send(
  { userId, network, reference, revision }: Act,
  desk: AnswerDesk,
  { sentBy, approvedBy, now }: { sentBy: string; approvedBy: string | null; now: Date },
): Promise<Decision> {
  const { complaint, pack, items, letter, kept } = desk;
  if (!letter.isReady || !kept) return { kind: 'refused', message: GONE };
  const outcome = await sendReply(userId, complaint, {
    text: letter.text,
    pdf: await pdfOf({ ...desk, network }, letter.text, now),
    pack,
    items,
    replyTo: await replyAddressOf(network, reference),
    sentBy,
    approvedBy,
    answer: { id: kept.id, revision },
    repliesSoFar: desk.repliesSoFar,
  });
  return outcome.kind === 'sent' ? { kind: 'done' } : { kind: 'refused', message: unsentReason(outcome) };
}

/** Does something to the answer at the act's revision and state, under the complaint's lock, and notes it. */
async function onAnswer(
  { userId, network, reference, revision }: Act,
  state: AnswerRow['state'],
  change: (
    answer: AnswerRow,
    transaction: Connection,
  ) => Promise<[action: string, detail: Record<string, unknown>]>,
): Promise<Decision> {
  return inTransaction(async (transaction) => {
    const complaint = await lockComplaint(network.id, reference, transaction);
    if (!complaint) return { kind: 'unknown' };
    const answer = await findOpenAnswer(complaint.id, transaction);
    if (answer?.state !== state || answer.revision !== revision) return { kind: 'refused', message: GONE };
    const [action, detail] = await change(answer, transaction);
    await appendAudit(
      { userId, networkId: network.id, action, subject: `complaint ${reference}`, detail },
      transaction,
    );
    return { kind: 'done' };
  });
}
