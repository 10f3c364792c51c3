import { listIssued } from '#db/queries/issuedSummaries';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { keepFile } from '../../files/keptFile';
import { type JobWatch } from '../../threads/messages';
import { computeMonth } from '../document/computeMonth';
import { renderFile } from '../document/render';
import { changedFigures } from '../life/changedFigures';
import { differencesSinceIssue } from '../life/differences';
import { keepDocument, readDocument } from '../life/document';
import { keptFigures, measureMonth, type MeasuredMonth } from '../life/measure';
import { manifestGrounds } from '../seal/manifest';
import {
  type DocumentTask,
  type KeptFile,
  type KeptMonth,
  type MeasureTask,
  type MonthResult,
  type MonthTask,
  type MonthWork,
  type RenderTask,
} from './tasks';

/** Does in this thread what was asked of a month. */
export function doMonthTask(task: MonthTask, watch: JobWatch): Promise<MonthResult> {
  switch (task.kind) {
    case 'measure':
      return measure(task, watch);
    case 'compare':
      return compare(task);
    case 'keep':
      return keep(task);
    case 'render':
      return render(task);
    case 'document':
      return documentOf(task);
  }
}

async function measure(task: MeasureTask, { onProgress }: JobWatch): Promise<KeptMonth> {
  const { network, month, asOf, reviewed } = task;
  const measured = await measureMonth(network, month, asOf, (done, all) => onProgress({ done, all }));
  const { doc, data, fingerprint } = measured;
  const documentSha256 = (await keepDocument(doc)).toString('hex');
  const moved = reviewed === null ? null : await movedSince(reviewed, doc);
  return {
    documentSha256,
    data,
    ...manifestGrounds(doc),
    fingerprint: fingerprint.toString('hex'),
    figures: keptFigures(doc),
    moved,
    changes: moved === 0 ? await changesSinceIssue(task, measured) : null,
  };
}

async function movedSince(reviewed: string, doc: MonthDocument): Promise<number | null> {
  const old = await readDocument(Buffer.from(reviewed, 'hex'));
  return old && changedFigures(old, doc).length;
}

async function changesSinceIssue(
  { network, month, asOf }: Pick<MeasureTask, 'network' | 'month' | 'asOf'>,
  measured?: MeasuredMonth,
): Promise<KeptMonth['changes']> {
  const [issued] = await listIssued(network.id, month);
  return issued ? (await differencesSinceIssue(network, issued, asOf, measured)).changes : null;
}

function compare({ network, month, now }: MonthWork['compare']['task']): Promise<KeptMonth['changes']> {
  return changesSinceIssue({ network, month, asOf: now });
}

async function keep({ documentSha256, context, format }: MonthWork['keep']['task']): Promise<KeptFile> {
  const doc = await readDocument(Buffer.from(documentSha256, 'hex'));
  if (!doc) throw new Error(`There are no figures for the ${format}.`);
  const { name, mediaType, bytes } = await renderFile(doc, context, format);
  const sha256 = (await keepFile('summaries', bytes)).toString('hex');
  return { name, mediaType, byteCount: bytes.length, sha256 };
}

async function render(task: RenderTask): Promise<MonthWork['render']['result']> {
  const doc = await documentOf(task);
  return doc && renderFile(doc, task.context, task.format);
}

async function documentOf({ network, source }: DocumentTask): Promise<MonthDocument | null> {
  if ('documentSha256' in source) return readDocument(Buffer.from(source.documentSha256, 'hex'));
  try {
    return await computeMonth(network, source.month, source.asOf);
  } catch (error) {
    // It has not begun.
    if (error instanceof RangeError) return null;
    throw error;
  }
}
