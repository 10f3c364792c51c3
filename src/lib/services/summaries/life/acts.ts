import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { type NetworkRow } from '#db/queries/networks';
import {
  deleteDraft,
  findLatestDraft,
  insertDraft,
  lockDraft,
  updateDraft,
  type SummaryDraftRow,
} from '#db/queries/summaryDrafts';
import { decideProposal, lockProposal } from '#db/queries/summaryProposals';
import { type MonthAct, type ProposalDecision } from '#lib/contracts/summaryLife';
import { done, invalid, unknown, type Outcome } from '../../outcome';
import { closedMonths } from './months';

export interface MonthActor {
  network: NetworkRow;
  month: string;
  userId: string;
}

const NOT_CLOSED = unknown('The network has no month of this name that has data and is over.');

const before = (detail: string): Outcome<never> => ({ kind: 'before', code: 'summary-state', detail });

/** Does what an operator asks of a month. What is issued stays as it is: to draft after it makes the next revision. */
export async function actOnMonth(actor: MonthActor, act: MonthAct): Promise<Outcome<null>> {
  const nowSec = Math.floor(Date.now() / 1000);
  const closed = await closedMonths(actor.network, nowSec);
  if (!closed.some(({ month }) => month === actor.month)) return NOT_CLOSED;
  return inTransaction(async (transaction) => {
    const found = await findLatestDraft(actor.network.id, actor.month, transaction);
    const draft = found && (await lockDraft(found, transaction));
    const outcome = await step(actor, act, draft, transaction);
    if (outcome.kind !== 'done') return outcome;
    await note(actor, `summary.${act.act}`, outcome.value, transaction);
    return done(null);
  });
}

/** The revision that was acted on. */
async function step(
  actor: MonthActor,
  act: MonthAct,
  draft: SummaryDraftRow | undefined,
  transaction: Connection,
): Promise<Outcome<number>> {
  if (act.act === 'draft') return draftAgain(actor, draft, transaction);
  if (!draft) return before('The month has not been drafted yet.');
  if (draft.state === 'issued') return before(`Revision ${draft.revision} is issued: it stays as it is.`);
  if (draft.state === 'issuing') return before('It is being issued: wait until it is done.');
  switch (act.act) {
    case 'submit':
      if (draft.state === 'review') return before('It is in review already.');
      if (!draft.computedAt || !draft.documentSha256) return before('Its figures are not made yet.');
      await updateDraft(
        draft,
        { state: 'review', submitted: { by: actor.userId, at: new Date() } },
        transaction,
      );
      return done(draft.revision);
    case 'return':
      if (draft.state === 'draft') return before('It is a draft already.');
      await updateDraft(draft, { state: 'draft', submitted: null }, transaction);
      return done(draft.revision);
    case 'discard':
      if (draft.revision === 1) return before('The first revision is not given up; draft it again instead.');
      await deleteDraft(draft, transaction);
      return done(draft.revision);
    case 'issue':
      return request(actor, act, draft, transaction);
  }
}

async function draftAgain(
  { network, month }: MonthActor,
  draft: SummaryDraftRow | undefined,
  transaction: Connection,
): Promise<Outcome<number>> {
  if (draft?.state === 'issuing') return before('It is being issued: wait until it is done.');
  if (!draft || draft.state === 'issued') {
    const revision = (draft?.revision ?? 0) + 1;
    const isNew = await insertDraft({ networkId: network.id, month, revision }, null, transaction);
    return isNew ? done(revision) : before('Somebody else has drafted it meanwhile.');
  }
  await updateDraft(draft, { state: 'draft', computedAt: null, failure: null, submitted: null }, transaction);
  return done(draft.revision);
}

/** Asks for the files: a worker makes them, after it has compared the figures with those that were reviewed. */
async function request(
  { userId }: MonthActor,
  { documentSha256, note: words }: Extract<MonthAct, { act: 'issue' }>,
  draft: SummaryDraftRow,
  transaction: Connection,
): Promise<Outcome<number>> {
  if (draft.state !== 'review') return before('It is not in review.');
  if (!draft.computedAt || draft.documentSha256?.toString('hex') !== documentSha256) {
    return invalid('documentSha256', 'is not what is in review now: look at the figures again');
  }
  const requested = { by: userId, at: new Date(), note: words };
  await updateDraft(draft, { state: 'issuing', requested, failure: null, progress: 0 }, transaction);
  return done(draft.revision);
}

/** Decides on a proposal: accepted, the next revision is drafted; dismissed, the issued one stands as it is. */
export function decideOnProposal(
  actor: MonthActor,
  id: number,
  { decision, reason }: ProposalDecision,
): Promise<Outcome<null>> {
  const { network, month, userId } = actor;
  return inTransaction<Outcome<null>>(async (transaction) => {
    const proposal = await lockProposal(network.id, id, transaction);
    if (!proposal || proposal.month !== month) return unknown('The month has no such proposal.');
    if (proposal.state !== 'open')
      return before('Somebody has decided on it, or other changes took its place.');
    const state = decision === 'accept' ? 'accepted' : 'dismissed';
    await decideProposal(id, { state, by: userId, reason }, transaction);
    if (decision === 'accept') {
      const revision = proposal.ofRevision + 1;
      await insertDraft({ networkId: network.id, month, revision }, id, transaction);
    }
    await note(actor, `summary.${decision}-proposal`, proposal.ofRevision, transaction);
    return done(null);
  });
}

async function note(
  { network, month, userId }: MonthActor,
  action: string,
  revision: number,
  transaction: Connection,
): Promise<void> {
  const subject = `summary ${month} revision ${revision}`;
  await appendAudit({ userId, networkId: network.id, action, subject, detail: {} }, transaction);
}
