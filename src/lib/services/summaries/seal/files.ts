import { type Readable } from 'node:stream';
import {
  listIssued,
  listIssuedFiles,
  type IssuedFileRow,
  type IssuedSummaryRow,
} from '#db/queries/issuedSummaries';
import { streamKeptFile } from '../../files/keptFile';

/** An issued revision by its number, or the latest. */
export async function issuedSummary(
  networkId: number,
  month: string,
  revision: number | null,
): Promise<{ row: IssuedSummaryRow; isSuperseded: boolean } | null> {
  const rows = await listIssued(networkId, month);
  const row = revision === null ? rows[0] : rows.find((one) => one.revision === revision);
  return row ? { row, isSuperseded: row !== rows[0] } : null;
}

/** Files of an issued revision in the given formats; all of them when none are given. */
export async function issuedFiles(
  summaryId: number,
  formats: readonly string[] | null = null,
): Promise<IssuedFileRow[]> {
  const files = await listIssuedFiles([summaryId]);
  return formats === null ? files : files.filter(({ format }) => formats.includes(format));
}

/** An issued file’s bytes; null when it is gone or is no longer what was sealed. */
export function openIssuedFile({ sha256 }: IssuedFileRow): Promise<Readable | null> {
  return streamKeptFile('summaries', sha256);
}
