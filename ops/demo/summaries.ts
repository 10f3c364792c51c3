import { type NetworkRow } from '#db/queries/networks';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { makeWaitingMonth } from '#ingest/summaries/draftMonths';
import { actOnMonth } from '#lib/services/summaries/life/acts';
import { closedMonths } from '#lib/services/summaries/life/months';
import { must } from './must';

/** Drafts, reviews and issues the earliest month that is over, as the operator; later ones are left to the worker. @returns months issued. */
export async function seedSummaries(network: NetworkRow, operatorId: string): Promise<number> {
  const closed = await closedMonths(network, Math.floor(Date.now() / 1000));
  const month = closed.at(-1)?.month;
  if (month === undefined) return 0;
  const actor = { network, month, userId: operatorId };
  must(await actOnMonth(actor, { act: 'draft' }));
  await makeWaitingMonth(new Date());
  must(await actOnMonth(actor, { act: 'submit' }));
  const reviewed = await findLatestDraft(network.id, month);
  const documentSha256 = reviewed?.documentSha256?.toString('hex') ?? '';
  const note = 'The first month of the network, not measured from its beginning.';
  must(await actOnMonth(actor, { act: 'issue', documentSha256, confirm: true, note }));
  await makeWaitingMonth(new Date());
  return (await findLatestDraft(network.id, month))?.state === 'issued' ? 1 : 0;
}
