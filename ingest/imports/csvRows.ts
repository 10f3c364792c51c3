import { createReadStream } from 'node:fs';
import { pipeline } from 'node:stream';
import { parse, type CsvError, type Info } from 'csv-parse';

/** The file cannot be read on as CSV; the message says where and why. */
export class UnreadableFile extends Error {
  override readonly name = 'UnreadableFile';
}

/** Rows of a file, and how far the file has been read with the last of them. */
export interface RowChunk {
  rows: { cells: string[]; line: number }[];
  bytesDone: number;
  linesDone: number;
}

const MOST_ROW_BYTES = 64 * 1024;

/**
 * Reads a CSV file in chunks of rows from where an earlier reading ended (or past its heading, from 0), so that reading can be
 * left and taken up after every chunk. Memory holds a chunk, not the file.
 * @throws {UnreadableFile}
 */
export async function* rowChunks(
  path: string,
  from: { bytesDone: number; linesDone: number },
  format: { delimiter: string; headerLine: number },
  rowsAChunk: number,
): AsyncGenerator<RowChunk> {
  const parser = parse({
    delimiter: format.delimiter,
    bom: from.bytesDone === 0,
    from_line: from.bytesDone === 0 ? format.headerLine + 1 : 1,
    info: true,
    relax_column_count: true,
    relax_quotes: true,
    skip_empty_lines: true,
    max_record_size: MOST_ROW_BYTES,
  });
  let chunk: RowChunk = { rows: [], bytesDone: from.bytesDone, linesDone: from.linesDone };
  // The parser ends with the file's error, and the file with the parser, also when reading is left.
  pipeline(createReadStream(path, { start: from.bytesDone }), parser, () => undefined);
  try {
    for await (const { record, info } of parser as AsyncIterable<{ record: string[]; info: Info }>) {
      chunk.bytesDone = from.bytesDone + info.bytes;
      chunk.linesDone = from.linesDone + info.lines;
      chunk.rows.push({ cells: record, line: chunk.linesDone });
      if (chunk.rows.length === rowsAChunk) {
        yield chunk;
        chunk = { ...chunk, rows: [] };
      }
    }
  } catch (error) {
    throw isCsvError(error) ? new UnreadableFile(wordsOf(error, chunk.linesDone)) : error;
  }
  if (chunk.rows.length > 0) yield chunk;
}

function isCsvError(error: unknown): error is CsvError {
  return /^CSV_/.test((error as { code?: string }).code ?? '');
}

function wordsOf({ code }: CsvError, linesDone: number): string {
  const where = `after line ${linesDone}`;
  if (code === 'CSV_QUOTE_NOT_CLOSED' || code === 'CSV_MAX_RECORD_SIZE') {
    return `The file cannot be read ${where}: a row is longer than 64 KiB, or a quotation mark is never closed.`;
  }
  return `The file cannot be read ${where}: it is not CSV there.`;
}
