import type { StoredInterval } from '#db/queries/intervals';
import { bandAt, type BandFraction } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

/** The bands, of one fraction, that a list of intervals has a column for. */
export interface BandColumns {
  nominalHz: number[];
  /** An interval's band levels in dB, one a column; null where it has none. */
  levelsOf(interval: StoredInterval): (number | null)[];
}

/** Columns for every band that some band sets have between them, ascending. */
export function bandColumns(fraction: BandFraction, sets: Iterable<Int8Array>): BandColumns {
  const distinct = new Set(sets);
  const indices = [...new Set([...distinct].flatMap((set) => [...set]))].sort((a, b) => a - b);
  const placesBySet = new Map([...distinct].map((set) => [set, indices.map((index) => set.indexOf(index))]));
  return {
    nominalHz: indices.map((index) => bandAt(fraction, index).nominalHz),
    levelsOf: ({ bandIndices, levelsCentiDb }) =>
      (placesBySet.get(bandIndices) ?? []).map((place) => {
        const centiDb = levelsCentiDb[place] ?? NO_LEVEL_CENTI_DB;
        return centiDb === NO_LEVEL_CENTI_DB ? null : centiDb / 100;
      }),
  };
}

/** Hundredths of a dB as dB. */
export function inDb(centiDb: number | null): number | null {
  return centiDb === null ? null : centiDb / 100;
}
