import { type Band } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type SpectrogramColumns } from '#lib/contracts/spectrogramBinary';
import { type ColumnPlan } from './columnPlan';

/** Columns to be filled, and the bands that their levels are of. */
export interface Columns extends Omit<SpectrogramColumns, 'header' | 'percentiles'> {
  plan: ColumnPlan;
  bands: readonly Band[];
  /** Place in `bands` by `bandSlot`; −1 for bands that are not shown. */
  placeOfSlot: Int8Array;
}

/** Columns of nothing. */
export function emptyColumns(plan: ColumnPlan, bands: readonly Band[], placeOfSlot: Int8Array): Columns {
  const { count } = plan;
  const none = () => new Int16Array(count).fill(NO_LEVEL_CENTI_DB);
  return {
    plan,
    bands,
    placeOfSlot,
    startSec: startsOf(plan),
    presentSec: new Uint32Array(count),
    validSec: new Uint32Array(count),
    lateSec: new Uint32Array(count),
    reasonBits: new Uint16Array(count),
    flagBits: new Uint16Array(count),
    laeqCentiDb: none(),
    lafmaxCentiDb: none(),
    lafminCentiDb: none(),
    levelsCentiDb: new Int16Array(count * bands.length).fill(NO_LEVEL_CENTI_DB),
  };
}

function startsOf({ count, fromSec, stepSec }: ColumnPlan): Uint32Array {
  const startSec = new Uint32Array(count);
  for (let at = 0; at < count; at += 1) startSec[at] = fromSec + at * stepSec;
  return startSec;
}

/** Adds to the number at a place. */
export function addAt(array: Uint32Array, at: number, amount: number): void {
  array[at] = (array[at] ?? 0) + amount;
}

/** Sets the bits of `mask` at a place. */
export function setBitsAt(array: Uint16Array, at: number, mask: number): void {
  array[at] = (array[at] ?? 0) | mask;
}

/** Keeps the higher of a column's level and another, where there is one. */
export function raiseAt(array: Int16Array, at: number, centiDb: number | null): void {
  if (centiDb !== null && centiDb > (array[at] ?? NO_LEVEL_CENTI_DB)) array[at] = centiDb;
}

/** Keeps the lower of a column's level and another, where there is one. */
export function lowerAt(array: Int16Array, at: number, centiDb: number | null): void {
  if (centiDb === null) return;
  const had = array[at] ?? NO_LEVEL_CENTI_DB;
  if (had === NO_LEVEL_CENTI_DB || centiDb < had) array[at] = centiDb;
}
