import { Readable } from 'node:stream';
import { type ReadableStream } from 'node:stream/web';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { SUMMARY_FORMATS, type SummaryFormat } from '#lib/contracts/summaries';
import { computeMonth } from '#lib/services/summaries/document/computeMonth';
import { renderFiles } from '#lib/services/summaries/document/render';
import { readDocument } from '#lib/services/summaries/life/document';
import { issuedFiles, issuedSummary, openIssuedFile } from '#lib/services/summaries/seal/files';
import { summaryCsv } from '#lib/services/summaries/summaryCsv';
import { readMark, summarySettings } from '#lib/services/summaries/template/settings';
import { notFound, Problem } from './problem';
import { csv, download, json } from './respond';

const FILE = /^(\d{4}-(?:0[1-9]|1[0-2]))\.([a-z]+|manifest\.json|manifest\.sig)$/;
const NO_STORE = { 'Cache-Control': 'no-store' };

/** A file of a month: of an issued revision from where it is kept, else of a draft. @throws {Problem} 404 */
export async function summaryFile(
  network: NetworkRow,
  name: string,
  revisionText: string | null,
): Promise<Response> {
  const [, month = '', ending = ''] = FILE.exec(name) ?? [];
  const revision = revisionText === null ? null : revisionOf(revisionText);
  const issued = month === '' ? null : await issuedSummary(network.id, month, revision);
  if (issued && ending.startsWith('manifest'))
    return sealFile(issued.row, ending, `${network.slug}-${month}`);
  const format = SUMMARY_FORMATS.find((known) => known === ending);
  if (!format) {
    throw notFound(
      `A summary is a month and a format, such as 2026-03.pdf; formats: ${SUMMARY_FORMATS.join(', ')}. Only an issued one has a seal.`,
    );
  }
  if (issued) return issuedFile(issued, month, format, network.id);
  const doc = await draftDocument(network, month, revision);
  return draftFile(network, doc, format);
}

function revisionOf(text: string): number {
  if (!/^\d{1,4}$/.test(text)) throw notFound('A revision is a number, such as 2.');
  return Number(text);
}

type Issued = NonNullable<Awaited<ReturnType<typeof issuedSummary>>>;

async function issuedFile(
  { row, isSuperseded }: Issued,
  month: string,
  format: SummaryFormat,
  networkId: number,
): Promise<Response> {
  const [file] = await issuedFiles(row.id, [format]);
  const stream = file && (await openIssuedFile(file));
  if (!file) throw notFound(`Revision ${row.revision} of ${month} was not issued in this format.`);
  if (!stream) {
    throw new Problem(
      500,
      'file-damaged',
      'The file is damaged',
      `What is kept of revision ${row.revision} of ${month} is gone or is not what was sealed; it is not given out. Restore it from a backup.`,
    );
  }
  const latest = isSuperseded ? await issuedSummary(networkId, month, null) : null;
  return new Response(Readable.toWeb(stream) as ReadableStream as globalThis.ReadableStream, {
    headers: {
      ...NO_STORE,
      'Content-Type': file.mediaType,
      'Content-Length': String(file.byteCount),
      'Content-Disposition': `attachment; filename="${file.name}"`,
      'Bittern-Revision': String(row.revision),
      ...(latest ? { 'Bittern-Superseded': String(latest.row.revision) } : {}),
    },
  });
}

function sealFile({ manifest, signature, revision }: Issued['row'], ending: string, name: string): Response {
  const isManifest = ending === 'manifest.json';
  const file = `${name}-r${revision}.${ending}`;
  const answer = isManifest
    ? download(manifest, 'application/json', file)
    : download(new Uint8Array(signature), 'application/octet-stream', file);
  answer.headers.set('Bittern-Revision', String(revision));
  return answer;
}

/** Figures of a draft: as of now, or, asked for by the number of a revision that is being made, as they are in review. */
async function draftDocument(
  network: NetworkRow,
  month: string,
  revision: number | null,
): Promise<MonthDocument> {
  const draft = revision === null ? undefined : await findLatestDraft(network.id, month);
  if (revision !== null) {
    const isAsked = draft?.revision === revision && draft.documentSha256 !== null;
    const doc = isAsked && draft.documentSha256 ? await readDocument(draft.documentSha256) : null;
    if (!doc)
      throw notFound('No such revision of this month; without `revision` you get the latest, or a draft.');
    return doc;
  }
  try {
    return await computeMonth(network, month, new Date());
  } catch (error) {
    if (error instanceof RangeError) throw notFound('This month has not begun.');
    throw error;
  }
}

async function draftFile(network: NetworkRow, doc: MonthDocument, format: SummaryFormat): Promise<Response> {
  const headers = { 'Bittern-Revision': 'draft' };
  if (format === 'json') return json({ ...doc, status: 'draft' }, { headers });
  if (format === 'csv')
    return csv(summaryCsv({ ...doc, status: 'draft' }), `${network.slug}-${doc.month}.csv`);
  const settings = await summarySettings(network.id);
  const [file] = await renderFiles(
    doc,
    { template: settings.template, mark: await readMark(settings.mark), revision: null },
    [format],
  );
  if (!file) throw new Error(`There is no ${format}.`);
  const answer = download(new Uint8Array(file.bytes), file.mediaType, file.name);
  answer.headers.set('Bittern-Revision', 'draft');
  return answer;
}
