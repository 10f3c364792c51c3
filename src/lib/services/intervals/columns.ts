import { bandAt } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import type { StoredInterval } from '#db/queries/intervals';

/** Bands that some intervals have between them: absolute indices, ascending. */
export function bandIndicesOf(intervals: readonly StoredInterval[]): number[] {
  const seen = new Set<Int8Array>(intervals.map(({ bandIndices }) => bandIndices));
  const indices = new Set([...seen].flatMap((set) => [...set]));
  return [...indices].sort((a, b) => a - b);
}

/** Whether octaves and thirds are mixed, so that one list of bands cannot name both. */
export function hasMixedFractions(intervals: readonly StoredInterval[]): boolean {
  return new Set(intervals.map(({ bandFraction }) => bandFraction)).size > 1;
}

/** Nominal frequencies of the bands of some intervals of one fraction. */
export function nominalHzOf(intervals: readonly StoredInterval[], indices: readonly number[]): number[] {
  const fraction = intervals[0]?.bandFraction ?? 3;
  return indices.map((index) => bandAt(fraction, index).nominalHz);
}

/** An interval's band levels in dB in the order of `indices`; null where it has none. */
export function levelsIn(interval: StoredInterval, indices: readonly number[]): (number | null)[] {
  return indices.map((index) => {
    const at = interval.bandIndices.indexOf(index);
    const centiDb = at < 0 ? NO_LEVEL_CENTI_DB : (interval.levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB);
    return centiDb === NO_LEVEL_CENTI_DB ? null : centiDb / 100;
  });
}

/** Hundredths of a dB as dB. */
export function inDb(centiDb: number | null): number | null {
  return centiDb === null ? null : centiDb / 100;
}
