import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listIssued } from '#db/queries/issuedSummaries';
import { findNetworkById, listSettings } from '#db/queries/networks';
import { listWatchedDrafts, updateDraft, type SummaryDraftRow } from '#db/queries/summaryDrafts';
import { insertProposal, replaceOpenProposals } from '#db/queries/summaryProposals';
import { fingerprintOf } from '#lib/services/summaries/life/measure';
import { monthSpan } from '#lib/services/summaries/monthSpan';
import { monthWork } from '#lib/services/summaries/threads/months';
import { eachAlone } from '../jobs/alone';
import { thisWorker } from '../sharing/thisWorker';

/**
 * Looks at each issued month whose grounds have changed since it was looked at last, and proposes a revision where any of its figures
 * would be another now. @returns how many were compared.
 */
export async function watchIssuedMonths(now: Date): Promise<number> {
  const watch = async (watched: SummaryDraftRow) => {
    let compared = 0;
    if (await isUnchanged(watched)) return 0;
    await thisWorker.leases.during(`summary:${watched.networkId}:${watched.month}`, async () => {
      if (await compare(watched, now)) compared = 1;
    });
    return compared;
  };
  const subjectOf = ({ networkId, month }: SummaryDraftRow) => ({
    name: `network ${networkId}, ${month}`,
    networkId,
  });
  return eachAlone('watch-summaries', await listWatchedDrafts(), subjectOf, watch, now);
}

async function isUnchanged({ networkId, month, fingerprint }: SummaryDraftRow): Promise<boolean> {
  const span = monthSpan(month, await listSettings(networkId));
  return fingerprint?.equals(await fingerprintOf(networkId, span)) === true;
}

async function compare(watched: SummaryDraftRow, now: Date): Promise<boolean> {
  const { networkId, month, revision } = watched;
  const network = await findNetworkById(networkId);
  if (!network) return false;
  const span = monthSpan(month, await listSettings(networkId));
  const fingerprint = await fingerprintOf(networkId, span);
  const [issued] = await listIssued(networkId, month);
  if (!issued || issued.revision !== revision) return false;
  const changes = (await monthWork('compare', { network, month, now })) ?? [];
  await inTransaction(async (transaction) => {
    await updateDraft(watched, { fingerprint }, transaction);
    if (changes.length === 0) {
      await replaceOpenProposals({ networkId, month }, null, transaction);
      return;
    }
    const isNew = await insertProposal({ networkId, month, ofRevision: revision, changes }, transaction);
    if (!isNew) return;
    await appendAudit(
      {
        userId: null,
        networkId,
        action: 'summary.propose',
        subject: `summary ${month} revision ${revision}`,
        detail: { changes: changes.length },
      },
      transaction,
    );
  });
  return true;
}
