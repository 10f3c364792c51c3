import { closeDb } from '#db/client';
import { findNetworkBySlug } from '#db/queries/networks';
import { findLatestDraft, insertDraft, updateDraft } from '#db/queries/summaryDrafts';
import { makeWaitingMonth } from '#ingest/summaries/draftMonths';
import { msOf } from './measure';
import { residentMib } from './memory';

/** What making a month took. */
export interface MadeMonth {
  draftedMs: number;
  issuedMs: number;
  /** Highest memory of the whole process until it is drafted, and until it is issued. */
  draftedMib: number;
  issuedMib: number;
  stations: number;
}

/** Drafts and issues January 2025 as a worker does, and prints what it took. Started by `summaries.ts`, with the person who issues it. */
const [slug = '', userId = ''] = process.argv.slice(2);
const network = await findNetworkBySlug(slug);
if (!network) throw new Error('There is no network to make a month of.');
const key = { networkId: network.id, month: '2025-01', revision: 1 };
await insertDraft(key, null);
const draftedMs = await msOf(async () => {
  await makeWaitingMonth(new Date());
});
const draftedMib = residentMib(process.pid).highest;
await updateDraft(key, { state: 'issuing', requested: { by: userId, at: new Date(), note: '' } });
const issuedMs = await msOf(async () => {
  await makeWaitingMonth(new Date());
});
const made = await findLatestDraft(network.id, key.month);
if (made?.state !== 'issued') throw new Error(`It was not issued: ${made?.failure ?? ''}`);
await closeDb();
const told: MadeMonth = {
  draftedMs,
  issuedMs,
  draftedMib,
  issuedMib: residentMib(process.pid).highest,
  stations: made.figures?.length ?? 0,
};
console.log(JSON.stringify(told));
process.exit(0);
