import { inTransaction } from '#db/queries/connection';
import { listNetworks, findNetworkById, type NetworkRow } from '#db/queries/networks';
import {
  findLatestDraft,
  insertDraft,
  listDrafts,
  listWaitingDrafts,
  lockDraft,
  updateDraft,
  type SummaryDraftRow,
} from '#db/queries/summaryDrafts';
import { failureWords } from '#lib/config/failureWords';
import { log } from '#lib/config/log';
import { removeKeptFile } from '#lib/services/files/keptFile';
import { dueMonths } from '#lib/services/summaries/life/months';
import { monthWork } from '#lib/services/summaries/threads/months';
import { eachAlone, networkSubject } from '../jobs/alone';
import { thisWorker } from '../sharing/thisWorker';
import { issueMonth } from './issueMonth';

/** Drafts the months that have closed since; of two workers at once one adds each month. @returns how many were added. */
export async function addDueDrafts(now: Date): Promise<number> {
  const addOfNetwork = async (network: NetworkRow) => {
    let added = 0;
    const known = new Set((await listDrafts(network.id)).map(({ month }) => month));
    for (const { month } of await dueMonths(network, now)) {
      if (known.has(month)) continue;
      if (await insertDraft({ networkId: network.id, month, revision: 1 }, null)) added += 1;
    }
    return added;
  };
  return eachAlone('draft-summaries', await listNetworks(), networkSubject, addOfNetwork, now);
}

/** Makes what waits longest: the figures of a draft, or the files of a month that somebody issues. @returns 1, or 0 when nothing waits. */
export async function makeWaitingMonth(now: Date): Promise<number> {
  for (const draft of await listWaitingDrafts()) {
    let isMade = false;
    await thisWorker.leases.during(`summary:${draft.networkId}:${draft.month}`, async () => {
      const current = await findLatestDraft(draft.networkId, draft.month);
      if (!current || current.revision !== draft.revision || !isWaiting(current)) return;
      await make(current, now);
      isMade = true;
    });
    if (isMade) return 1;
  }
  return 0;
}

const isWaiting = ({ state, computedAt }: SummaryDraftRow) =>
  state === 'issuing' || (state !== 'issued' && computedAt === null);

async function make(draft: SummaryDraftRow, now: Date): Promise<void> {
  try {
    if (draft.state === 'issuing') await issueMonth(draft, now);
    else await computeDraft(draft, now);
  } catch (error) {
    log().error({ err: error, month: draft.month, network: draft.networkId }, 'month not made');
    const failure = `It could not be made: ${failureWords(error)}`;
    // Tried again by hand, so that a month that always fails does not keep the worker busy.
    await updateDraft(draft, {
      failure,
      computedAt: draft.computedAt ?? now,
      progress: 0,
      ...(draft.state === 'issuing' ? { state: 'review', requested: null } : {}),
    });
  }
}

/** Makes a draft’s figures. */
async function computeDraft(draft: SummaryDraftRow, now: Date): Promise<void> {
  const network = await findNetworkById(draft.networkId);
  if (!network) return;
  const measured = await monthWork(
    'measure',
    { network, month: draft.month, asOf: now, reviewed: null },
    {
      onProgress: ({ done }) => {
        void updateDraft(draft, { progress: done }).catch(() => undefined);
      },
    },
  );
  const documentSha256 = Buffer.from(measured.documentSha256, 'hex');
  await inTransaction(async (transaction) => {
    const current = await lockDraft(draft, transaction);
    if (!current || current.state === 'issued') return;
    await updateDraft(
      draft,
      {
        computedAt: now,
        documentSha256,
        dataSha256: Buffer.from(measured.data.sha256, 'hex'),
        figures: measured.figures,
        failure: null,
        progress: 0,
      },
      transaction,
    );
  });
  if (draft.documentSha256 && !draft.documentSha256.equals(documentSha256)) {
    await removeKeptFile('summaries', draft.documentSha256);
  }
}
