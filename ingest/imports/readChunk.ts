import { type RowReason } from '#lib/contracts/imports';
import { readRecords, type Candidate } from '../receive/readRecords';
import { type RowChunk } from './csvRows';
import { type Layout } from './layout';
import { readRow } from './readRow';

/** A row that is not taken. */
export interface RefusedRow {
  index: number;
  reason: RowReason;
  detail: string;
}

/** The rows of a chunk, before any is compared with what is stored. */
export interface ReadChunk {
  records: unknown[];
  candidates: Candidate[];
  refused: RefusedRow[];
}

/** Reads the rows of a chunk as the records of a post. */
export function readChunk({ rows }: RowChunk, layout: Layout, nowSec: number): ReadChunk {
  const read = rows.map(({ cells }) => readRow(cells, layout));
  const records = read.map(({ record }) => record);
  const refused: RefusedRow[] = [];
  read.forEach(({ refusal }, index) => {
    if (refusal) refused.push({ index, reason: refusal.reason, detail: refusal.detail });
  });
  const unread = new Set(refused.map(({ index }) => index));
  const judged = readRecords(records, layout.bandSet, nowSec);
  for (const { index, refusal } of judged.refused) {
    if (!unread.has(index)) refused.push({ index, reason: refusal.code, detail: refusal.detail });
  }
  return { records, candidates: judged.candidates.filter(({ index }) => !unread.has(index)), refused };
}
