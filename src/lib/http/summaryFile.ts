import { Readable } from 'node:stream';
import { type ReadableStream } from 'node:stream/web';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { type NetworkRow } from '#db/queries/networks';
import { SUMMARY_FORMATS, type SummaryFormat } from '#lib/contracts/summaries';
import { issuedFiles, issuedSummary, openIssuedFile } from '#lib/services/summaries/seal/files';
import { readMark, summarySettings } from '#lib/services/summaries/template/settings';
import { monthWork } from '#lib/services/summaries/threads/months';
import { type DocumentSource } from '#lib/services/summaries/threads/tasks';
import { jobProblem } from './jobProblem';
import { notFound, Problem } from './problem';
import { download } from './respond';

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
  return draftFile(network, format, await draftSource(network, month, revision));
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
async function draftSource(
  network: NetworkRow,
  month: string,
  revision: number | null,
): Promise<DocumentSource> {
  if (revision === null) return { month, asOf: new Date() };
  const draft = await findLatestDraft(network.id, month);
  if (draft?.revision !== revision || draft.documentSha256 === null) throw noRevision();
  return { documentSha256: draft.documentSha256.toString('hex') };
}

const noRevision = () =>
  notFound('No such revision of this month; without `revision` you get the latest, or a draft.');

async function draftFile(
  network: NetworkRow,
  format: SummaryFormat,
  source: DocumentSource,
): Promise<Response> {
  const { template, mark } = await summarySettings(network.id);
  const context = { template, mark: await readMark(mark), revision: null };
  const file = await monthWork('render', { network, source, context, format }).catch((error: unknown) => {
    throw jobProblem(error, 'file');
  });
  if (!file) throw 'month' in source ? notFound('This month has not begun.') : noRevision();
  const answer = download(new Uint8Array(file.bytes), file.mediaType, file.name);
  answer.headers.set('Bittern-Revision', 'draft');
  return answer;
}
