import { type BandFraction } from './bands';
import { laeqFromBandsDb } from './laeqFromBands';
import { toTenths } from './rounding';

/** Difference in dB between LAeq reported and LAeq from bands above which an interval's data are questionable. */
const CONSISTENCY_BOUND_DB = 1;

/** Whether an interval's LAeq and its band levels tell the same. */
export type Consistency =
  /** The bands do not cover the range that matters. */
  | { kind: 'not-comparable' }
  | {
      kind: 'consistent' | 'inconsistent';
      /** LAeq reported minus LAeq from bands. */
      differenceDb: number;
    };

/** Compares an interval's reported LAeq with the A-weighted sum of its bands; more than 1 dB apart (in tenths) is a flag. */
export function consistencyOf(
  laeqCentiDb: number,
  fraction: BandFraction,
  levelsCentiDb: Int16Array,
  bandIndices: Int8Array,
): Consistency {
  const fromBandsDb = laeqFromBandsDb(fraction, levelsCentiDb, bandIndices);
  if (fromBandsDb === null) return { kind: 'not-comparable' };
  const differenceDb = laeqCentiDb / 100 - fromBandsDb;
  const isApart = toTenths(Math.abs(differenceDb)) > toTenths(CONSISTENCY_BOUND_DB);
  return { kind: isApart ? 'inconsistent' : 'consistent', differenceDb };
}
