import { parse } from 'csv-parse/sync';
import { bandsOf } from '#lib/acoustics/bands';
import { type ImportMapping } from '#lib/contracts/imports';
import { UnusableFile } from '#lib/services/imports/unusable';
import { CSV_LEADING, CSV_TRAILING } from '#lib/services/intervals/csv';
import { guessTargets } from './guessTarget';

/** What the beginning of a file shows. */
export interface Head {
  headings: string[];
  /** The first rows below the headings. */
  rows: string[][];
  /** A guess at what the columns are, for a person to correct. */
  guess: ImportMapping;
  /** Whether it is the contract's own format, of which nothing need be guessed. */
  isOwn: boolean;
}

const notCsv = (message: string) => new UnusableFile('unreadable', message);

const DELIMITERS = [',', ';', '\t'] as const;
const MOST_HEADER_LINES = 50;
const SHOWN_ROWS = 5;

/** What is known of the station that a file is for, and what a person has said of the file's shape. */
interface Circumstances {
  zone: string;
  intervalSec: number;
  shape?: Partial<Shape>;
}

/** What separates the columns, and the line of the headings. */
export interface Shape {
  delimiter: ImportMapping['delimiter'];
  headerLine: number;
}

/** Reads the first bytes of a file. @throws {UnusableFile} */
export function sniff(head: Buffer, { zone, intervalSec, shape = {} }: Circumstances): Head {
  if (head.length === 0) throw notCsv('The file is empty.');
  if (head[0] === 0x1f && head[1] === 0x8b) throw notCsv('The file is packed; unpack it first.');
  if (head.includes(0)) throw notCsv('The file is not UTF-8 text; save it as CSV (UTF-8) first.');
  const lines = wholeLines(head);
  const { delimiter, headerLine } = { ...shapeOf(lines), ...shape };
  const [headings = [], ...below] = cellsOf(lines.slice(headerLine - 1), delimiter);
  const rows = below.slice(0, SHOWN_ROWS);
  if (delimiter === ',' && isOwnFormat(headings)) {
    return { headings, rows, guess: ownMapping(headings, headerLine), isOwn: true };
  }
  const columns = guessTargets(headings);
  const timeAt = columns.findIndex((target) => target === 'start' || target === 'date');
  const times = below.map((row) => row[timeAt] ?? '');
  const guess: ImportMapping = {
    delimiter,
    decimal: delimiter !== ',' && below.some((row) => row.some(isCommaNumber)) ? ',' : '.',
    headerLine,
    columns,
    dateOrder: dateOrderOf(times),
    zone,
    marks: 'start',
    seconds: columns.includes('seconds') ? null : intervalSec,
  };
  return { headings, rows, guess, isOwn: false };
}

function wholeLines(head: Buffer): string[] {
  const text = head.toString('utf8').replace(/^\ufeff/, '');
  const lines = text.split(/\r\n|\n|\r/);
  // The last one may be cut short.
  return lines.length > 1 ? lines.slice(0, -1) : lines;
}

/** The headings are the first line with as many cells as most lines have, and they read as headings do. */
function shapeOf(lines: readonly string[]): Shape {
  const first = lines.slice(0, 2 * MOST_HEADER_LINES);
  const shapes = DELIMITERS.flatMap((delimiter) => {
    const rows = first.map((line) => line.split(delimiter));
    const cells = usualOf(rows.map(({ length }) => length).filter((count) => count > 1));
    const at = rows.findIndex(({ length }) => length === cells);
    const headings = rows[at];
    if (!headings || at >= MOST_HEADER_LINES) return [];
    return [{ delimiter, headerLine: at + 1, cells, areHeadings: looksLikeHeadings(headings) }];
  });
  shapes.sort((a, b) => Number(b.areHeadings) - Number(a.areHeadings) || b.cells - a.cells);
  const [best] = shapes;
  if (!best) throw notCsv('No columns could be told apart: the file is not CSV.');
  return { delimiter: best.delimiter, headerLine: best.headerLine };
}

/** The count that most lines have; of several the largest. */
function usualOf(counts: readonly number[]): number {
  const times = new Map<number, number>();
  for (const count of counts) times.set(count, (times.get(count) ?? 0) + 1);
  return [...times].sort((a, b) => b[1] - a[1] || b[0] - a[0])[0]?.[0] ?? 0;
}

/** Half of the cells are words or frequencies. Rows with decimal commas, split at the commas, are neither. */
function looksLikeHeadings(cells: readonly string[]): boolean {
  const fitting = cells.filter((cell) => /[a-z]/i.test(cell) || /^\s*"?\d+(\.\d)?"?\s*$/.test(cell));
  return fitting.length * 2 >= cells.length;
}

function cellsOf(lines: readonly string[], delimiter: string): string[][] {
  return parse(lines.slice(0, 100).join('\n'), {
    delimiter,
    relax_column_count: true,
    relax_quotes: true,
    skip_empty_lines: true,
    trim: true,
  });
}

const NOMINAL = new Set(bandsOf(3).map(({ nominalHz }) => String(nominalHz)));

function isOwnFormat(headings: readonly string[]): boolean {
  const bands = headings.slice(CSV_LEADING.length, headings.length - CSV_TRAILING.length);
  return (
    CSV_LEADING.every((name, at) => headings[at] === name) &&
    CSV_TRAILING.every((name, at) => headings.at(at - CSV_TRAILING.length) === name) &&
    bands.every((heading) => NOMINAL.has(heading))
  );
}

function ownMapping(headings: readonly string[], headerLine: number): ImportMapping {
  return {
    delimiter: ',',
    decimal: '.',
    headerLine,
    columns: [...headings],
    dateOrder: 'ymd',
    zone: 'UTC',
    marks: 'start',
    seconds: null,
  };
}

const isCommaNumber = (cell: string) => /^-?\d+,\d+$/.test(cell);

function dateOrderOf(times: readonly string[]): ImportMapping['dateOrder'] {
  const parts = times.map((time) => /^(\d+)[-/.](\d+)/.exec(time));
  if (parts.some((match) => (match?.[1]?.length ?? 0) === 4)) return 'ymd';
  if (parts.every((match) => match === null)) return 'ymd';
  return parts.some((match) => Number(match?.[2]) > 12) ? 'mdy' : 'dmy';
}
