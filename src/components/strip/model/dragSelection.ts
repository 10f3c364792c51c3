import { type Band } from '#lib/acoustics/bands';
import { type BandSelection, type Selection } from './selection';

/** A corner of a selection while it is made: an instant, and a band's place in the list or (null) none. */
export interface Corner {
  sec: number;
  bandAt: number | null;
}

/**
 * The selection between two corners: whole steps of `gridSec`, at least one, and the bands between, or all bands when a
 * corner names none or every band is taken in.
 */
export function selectionBetween(a: Corner, b: Corner, gridSec: number, bands: readonly Band[]): Selection {
  const fromSec = Math.floor(Math.min(a.sec, b.sec) / gridSec) * gridSec;
  const toSec = Math.max(fromSec + gridSec, Math.ceil(Math.max(a.sec, b.sec) / gridSec) * gridSec);
  return { fromSec, toSec, bands: bandsBetween(a.bandAt, b.bandAt, bands) };
}

function bandsBetween(a: number | null, b: number | null, bands: readonly Band[]): BandSelection | null {
  if (a === null || b === null) return null;
  const lowest = bands[Math.min(a, b)];
  const highest = bands[Math.max(a, b)];
  if (!lowest || !highest || Math.abs(a - b) === bands.length - 1) return null;
  return { fraction: lowest.fraction, lowestIndex: lowest.index, highestIndex: highest.index };
}
