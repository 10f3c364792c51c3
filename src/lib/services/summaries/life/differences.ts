import { inTransaction } from '#db/queries/connection';
import { listIssuedFiles, type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type FigureChange } from '#lib/contracts/summaryLife';
import { type SummaryManifest } from '#lib/contracts/summaryManifest';
import { openManifest } from '../seal/verify';
import { changedFigures } from './changedFigures';
import { readDocument } from './document';
import { measureMonth, type MeasuredMonth } from './measure';
import { withReasons } from './reasons';

/** What is stored of an issued month does not fit its seal: a file or the manifest was changed or is gone. */
export class SealBroken extends Error {
  constructor(month: string, revision: number, what: string) {
    super(`Revision ${revision} of ${month} does not fit its seal: ${what}.`);
    this.name = 'SealBroken';
  }
}

/** The sealed figures of an issued month, and its manifest. @throws {SealBroken} */
export async function sealedMonth(
  issued: IssuedSummaryRow,
): Promise<{ manifest: SummaryManifest; doc: MonthDocument }> {
  const opened = await openManifest(issued);
  if (!opened) throw new SealBroken(issued.month, issued.revision, 'manifest or signature');
  const stored = (await listIssuedFiles([issued.id])).find(({ format }) => format === 'json');
  const sealed = opened.manifest.files.find(({ format }) => format === 'json');
  const isSame = stored !== undefined && stored.sha256.toString('hex') === sealed?.sha256;
  const doc = isSame ? await readDocument(stored.sha256) : null;
  if (!doc) throw new SealBroken(issued.month, issued.revision, sealed?.name ?? 'its figures');
  return { manifest: opened.manifest, doc };
}

/** What would differ if an issued month were issued again now, figure by figure, and why. @throws {SealBroken} */
export async function differencesSinceIssue(
  network: NetworkRow,
  issued: IssuedSummaryRow,
  now: Date,
  measured?: MeasuredMonth,
): Promise<{ changes: FigureChange[]; measured: MeasuredMonth; manifest: SummaryManifest }> {
  const { manifest, doc } = await sealedMonth(issued);
  const found = measured ?? (await measureMonth(network, issued.month, now));
  const changes = await inTransaction((conn) =>
    withReasons(changedFigures(doc, found.doc), {
      networkId: network.id,
      stations: found.stations,
      span: found.span,
      since: issued.issuedAt,
      sealed: manifest.data,
      data: found.data,
      conn,
    }),
  );
  return { changes, measured: found, manifest };
}
