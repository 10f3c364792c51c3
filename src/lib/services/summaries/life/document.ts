import { monthDocumentSchema, type MonthDocument } from '#lib/contracts/monthDocument';
import { keepFile, readKeptFile } from '../../files/keptFile';

/** Keeps a month’s figures and answers the digest that names them. */
export function keepDocument(doc: MonthDocument): Promise<Buffer> {
  return keepFile('summaries', Buffer.from(`${JSON.stringify(doc)}\n`));
}

/** A month’s figures as they were kept by any version; null when they are gone or were changed. */
export async function readDocument(sha256: Buffer): Promise<MonthDocument | null> {
  const bytes = await readKeptFile('summaries', sha256);
  return bytes && monthDocumentSchema.parse(JSON.parse(bytes.toString('utf8')));
}

/** The same of figures that this version has just kept: their digest tells that they are of its form. */
export async function readFreshDocument(sha256: Buffer): Promise<MonthDocument | null> {
  const bytes = await readKeptFile('summaries', sha256);
  return bytes && (JSON.parse(bytes.toString('utf8')) as MonthDocument);
}
