import { listIssuedHeads, type IssuedHead } from '#db/queries/issuedSummaries';
import { listDraftHeads, type DraftHead } from '#db/queries/summaryDrafts';
import { listOpenProposalMonths } from '#db/queries/summaryProposals';
import { type SummaryMonth } from '#lib/contracts/summaries';

/** How a month stands. */
export type MonthStanding = Pick<
  SummaryMonth,
  'state' | 'revision' | 'issuedAt' | 'issuedBy' | 'revisions' | 'hasProposal'
>;

/** How a network’s months stand, by month; `isOver` is asked of months that nobody has drafted. */
export async function monthStandings(
  networkId: number,
): Promise<(month: string, isOver: boolean) => MonthStanding> {
  const [issued, drafts, proposed] = await Promise.all([
    listIssuedHeads(networkId),
    listDraftHeads(networkId),
    listOpenProposalMonths(networkId),
  ]);
  return (month, isOver) =>
    standingOf(
      issued.filter((one) => one.month === month),
      drafts.find((one) => one.month === month),
      proposed.includes(month),
      isOver,
    );
}

/** `issued` and drafts come latest first. */
function standingOf(
  issued: readonly IssuedHead[],
  draft: DraftHead | undefined,
  hasProposal: boolean,
  isOver: boolean,
): MonthStanding {
  const [latest] = issued;
  return {
    state: draft?.state ?? (isOver ? 'closed' : 'open'),
    revision: latest?.revision ?? null,
    issuedAt: latest?.issuedAt.toISOString() ?? null,
    issuedBy: latest?.issuedByName ?? null,
    revisions: issued.map(({ revision }) => revision),
    hasProposal,
  };
}
