import { type RowReason } from '#lib/contracts/imports';
import { type Layout } from './layout';
import { readRowTime } from './rowTime';

/** A row as the record that a monitor would have posted, and why it cannot be one. */
export interface ReadRow {
  record: Record<string, unknown>;
  refusal: { reason: RowReason; detail: string } | null;
}

const NUMBERS = [
  'LAeq',
  'LAFmax',
  'LAFmin',
  'LCeq',
  'LCpeak',
  'windSpeed',
  'windDirection',
  'temperature',
  'battery',
] as const;
/** What instruments write where they have no value. */
const NOTHING = new Set(['', '-', '--', '---', 'nan', 'na', 'n/a', 'null']);
const NUMBER = /^[+-]?(\d+(\.\d*)?|\.\d+)(e[+-]?\d+)?$/i;
const CLOCK_DURATION = /^(\d{1,2}):(\d{2}):(\d{2})(?:[.,]0+)?$/;

/** Reads a row by its layout. What is no number stays as it is, for the receiver to refuse. */
export function readRow(cells: readonly string[], layout: Layout): ReadRow {
  const { mapping, places, bands } = layout;
  const valueAt = (place: number | undefined) =>
    place === undefined ? undefined : valueOf(cells[place] ?? '', mapping.decimal);
  const seconds = mapping.seconds ?? secondsOf(cells[places.seconds ?? -1] ?? '', mapping.decimal);
  const time = readRowTime(cells, layout, typeof seconds === 'number' ? seconds : 0);
  const record: Record<string, unknown> = { start: 'start' in time ? time.start : time.shown, seconds };
  for (const name of NUMBERS) {
    if (places[name] !== undefined) record[name] = valueAt(places[name]);
  }
  if (places.flags !== undefined) record['flags'] = flagsOf(cells[places.flags] ?? '');
  record['levels'] = bands.map(({ place }) => valueAt(place));
  return { record, refusal: lengthProblem(cells, mapping.columns.length) ?? ('start' in time ? null : time) };
}

function lengthProblem(cells: readonly string[], expected: number): ReadRow['refusal'] {
  const hasTrailing = cells.length === expected + 1 && cells.at(-1)?.trim() === '';
  if (cells.length === expected || hasTrailing) return null;
  return { reason: 'malformed', detail: `The row has ${cells.length} cells; the heading has ${expected}.` };
}

function valueOf(cell: string, decimal: '.' | ','): number | string | null {
  const text = cell.trim();
  if (NOTHING.has(text.toLowerCase())) return null;
  const pointed = decimal === ',' ? text.replace(',', '.') : text;
  return NUMBER.test(pointed) ? Number(pointed) : text;
}

function secondsOf(cell: string, decimal: '.' | ','): number | string | null {
  const clock = CLOCK_DURATION.exec(cell.trim());
  if (!clock) return valueOf(cell, decimal);
  return Number(clock[1]) * 3600 + Number(clock[2]) * 60 + Number(clock[3]);
}

function flagsOf(cell: string): string[] {
  return cell.split(/\s+/).filter((flag) => flag !== '');
}
