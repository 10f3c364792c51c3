import { findLatestDraft } from '#db/queries/summaryDrafts';
import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummarySettings } from '#lib/contracts/summarySettings';
import { computeMonth } from '../document/computeMonth';
import { renderFiles } from '../document/render';
import { readDocument } from '../life/document';
import { closedMonths } from '../life/months';
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
  const doc = await previewedMonth(network, now);
  const [pdf] = await renderFiles(doc, { template, mark, revision: null }, ['pdf']);
  if (!pdf) throw new Error('There is no PDF.');
  return pdf.bytes;
}

/** Its figures as they were drafted, where they are at hand: to see the print, they need not be made anew. */
async function previewedMonth(network: NetworkRow, now: Date): Promise<MonthDocument> {
  const [latest] = await closedMonths(network, Math.floor(now.getTime() / 1000));
  const month = latest?.month ?? now.toISOString().slice(0, 7);
  const draft = await findLatestDraft(network.id, month);
  const drafted = draft?.documentSha256 ? await readDocument(draft.documentSha256) : null;
  return drafted ?? computeMonth(network, month, now);
}
