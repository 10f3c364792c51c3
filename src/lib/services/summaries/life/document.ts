import { type MonthDocument } from '#lib/contracts/monthDocument';
import { keepFile, readKeptFile } from '../../files/keptFile';

/** Keeps a month’s figures and answers the digest that names them. */
export function keepDocument(doc: MonthDocument): Promise<Buffer> {
  return keepFile('summaries', Buffer.from(`${JSON.stringify(doc)}\n`));
}

/**
 * A month’s figures as they were kept; null when they are gone or were changed. Their digest tells that they are what some version kept: to
 * look at each of a hundred stations’ million parts again would take seconds and a hundred megabytes.
 */
export async function readDocument(sha256: Buffer): Promise<MonthDocument | null> {
  const bytes = await readKeptFile('summaries', sha256);
  if (!bytes) return null;
  const doc = JSON.parse(bytes.toString('utf8')) as MonthDocument;
  // What earlier versions did not tell.
  for (const { yearToDate } of doc.stations) yearToDate.U ??= null;
  return doc;
}
