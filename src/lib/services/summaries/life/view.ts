import {
  listIssued,
  listIssuedFiles,
  type IssuedFileRow,
  type IssuedSummaryRow,
} from '#db/queries/issuedSummaries';
import { findLatestDraft, type SummaryDraftRow } from '#db/queries/summaryDrafts';
import { listProposals, type SummaryProposalRow } from '#db/queries/summaryProposals';
import {
  type IssuedRevision,
  type MonthLife,
  type RevisionProposal,
  type SummaryDraft,
} from '#lib/contracts/summaryLife';
import { groupBy } from '../../groupBy';

/** A month’s revisions, the one that is being made, and what is proposed. */
export async function monthLife(networkId: number, month: string): Promise<MonthLife> {
  const [revisions, draft, proposals] = await Promise.all([
    issuedRevisions(networkId, month),
    findLatestDraft(networkId, month),
    listProposals(networkId, month),
  ]);
  return {
    month,
    draft: draft && draft.state !== 'issued' ? draftJson(draft) : null,
    revisions,
    proposals: proposals.map(proposalJson),
  };
}

/** Issued revisions of a network, of one month where it is given; latest month and revision first. */
async function issuedRevisions(networkId: number, month: string | null = null): Promise<IssuedRevision[]> {
  const rows = await listIssued(networkId, month);
  const files = groupBy(await listIssuedFiles(rows.map(({ id }) => id)), ({ summaryId }) => summaryId);
  const latest = new Map<string, number>();
  for (const row of rows) latest.set(row.month, Math.max(latest.get(row.month) ?? 0, row.revision));
  return rows.map((row) =>
    revisionJson(row, files.get(row.id) ?? [], row.revision < (latest.get(row.month) ?? 0)),
  );
}

function revisionJson(
  row: IssuedSummaryRow,
  files: readonly IssuedFileRow[],
  isSuperseded: boolean,
): IssuedRevision {
  return {
    month: row.month,
    revision: row.revision,
    issuedAt: row.issuedAt.toISOString(),
    issuedBy: row.issuedByName,
    note: row.note,
    isSuperseded,
    manifestSha256: row.manifestSha256.toString('hex'),
    files: files.map(({ format, name, mediaType, byteCount, sha256 }) => ({
      format,
      name,
      mediaType,
      bytes: byteCount,
      sha256: sha256.toString('hex'),
    })),
    changes: row.changes,
  };
}

/** The revision that is being made, as the interface gives it. */
function draftJson(row: SummaryDraftRow): SummaryDraft {
  return {
    revision: row.revision,
    state: row.state,
    draftedAt: row.draftedAt.toISOString(),
    computedAt: row.computedAt?.toISOString() ?? null,
    progress: row.progress,
    dataSha256: row.dataSha256?.toString('hex') ?? null,
    documentSha256: row.documentSha256?.toString('hex') ?? null,
    failure: row.failure,
  };
}

function proposalJson(row: SummaryProposalRow): RevisionProposal {
  return {
    id: row.id,
    ofRevision: row.ofRevision,
    foundAt: row.foundAt.toISOString(),
    state: row.state,
    decidedAt: row.decidedAt?.toISOString() ?? null,
    reason: row.reason,
    changes: row.changes,
  };
}
