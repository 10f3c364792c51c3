import { findLatestDraft } from '#db/queries/summaryDrafts';
import { type NetworkRow } from '#db/queries/networks';
import { type SummarySettings } from '#lib/contracts/summarySettings';
import { closedMonths } from '../life/months';
import { monthWork } from '../threads/months';
import { markOf, readMark, summarySettings, type MarkChange } from './settings';

/** A month as settings would print it, as PDF: the latest that is over, else the one under way. Nothing is kept. */
export async function previewPdf(
  network: NetworkRow,
  { template }: SummarySettings,
  markChange: MarkChange,
  now: Date,
): Promise<Uint8Array> {
  const mark =
    markChange === 'keep'
      ? await readMark((await summarySettings(network.id)).mark)
      : markChange && markOf(markChange);
  const [latest] = await closedMonths(network, Math.floor(now.getTime() / 1000));
  const month = latest?.month ?? now.toISOString().slice(0, 7);
  const draft = await findLatestDraft(network.id, month);
  const task = { network, context: { template, mark, revision: null }, format: 'pdf' as const };
  // To see the print, figures need not be made anew where they were drafted.
  const drafted = draft?.documentSha256
    ? await monthWork('render', {
        ...task,
        source: { documentSha256: draft.documentSha256.toString('hex') },
      })
    : null;
  const pdf = drafted ?? (await monthWork('render', { ...task, source: { month, asOf: now } }));
  if (!pdf) throw new Error('There is no PDF.');
  return pdf.bytes;
}
