import { setTimeout } from 'node:timers/promises';
import { db } from '#db/client';
import { findNetworkBySlug, type NetworkRow } from '#db/queries/networks';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { makeWaitingMonth } from '#ingest/summaries/draftMonths';
import { actOnMonth } from '#lib/services/summaries/life/acts';
import { type Outcome } from '#lib/services/outcome';
import { at, storeMinutes } from '../complaints/support';

export const MONTH = '2026-03';

/** Levels of March 2026, with the night of the clock change, at a station; one a minute. */
export async function storeMarch(stationId: number, laeqCentiDb: number): Promise<void> {
  await storeMinutes(stationId, at('2026-03-01T07:00:00Z'), at('2026-04-01T06:00:00Z'), (startSec) => {
    // A day in the middle came by no post.
    const day = new Date(startSec * 1000).toISOString().slice(0, 10);
    return day === '2026-03-12' ? null : { laeqCentiDb: laeqCentiDb + (startSec % 7) * 10 };
  });
}

export async function network(): Promise<NetworkRow> {
  const found = await findNetworkBySlug('merrow');
  if (!found) throw new Error('There is no network.');
  return found;
}

export function must<T>(outcome: Outcome<T>): T {
  if (outcome.kind !== 'done') throw new Error(JSON.stringify(outcome));
  return outcome.value;
}

/** Drafts, submits and issues the month’s next revision as a person would, the worker’s part included. */
export async function issue(userId: string, note = ''): Promise<number> {
  const actor = { network: await network(), month: MONTH, userId };
  const draft = await findLatestDraft(actor.network.id, MONTH);
  if (!draft || draft.state === 'issued') must(await actOnMonth(actor, { act: 'draft' }));
  await makeWaitingMonth(new Date());
  must(await actOnMonth(actor, { act: 'submit' }));
  const reviewed = await findLatestDraft(actor.network.id, MONTH);
  const documentSha256 = reviewed?.documentSha256?.toString('hex') ?? '';
  must(await actOnMonth(actor, { act: 'issue', documentSha256, confirm: true, note }));
  await makeWaitingMonth(new Date());
  const issued = await findLatestDraft(actor.network.id, MONTH);
  if (issued?.state !== 'issued') throw new Error(`It was not issued: ${issued?.failure ?? ''}`);
  return issued.revision;
}

/** An hour more of a station, as if its posts had come just now; waits out the second, since that is as fine as a receipt is noted. */
export async function storeLate(stationId: number, start: string): Promise<void> {
  const startSec = at(start);
  await storeMinutes(stationId, startSec, startSec + 3600, () => ({ laeqCentiDb: 7500 }));
  await db()('interval_levels')
    .where({ station_id: stationId })
    .whereBetween('starts_at', [startSec, startSec + 3599])
    .update({ received_at: Math.floor(Date.now() / 1000) });
  await setTimeout(1000 - (Date.now() % 1000));
}
