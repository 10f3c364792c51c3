import { toTenths } from './rounding';

/** Default bound of LCeq − LAeq in dB above which low frequencies deserve a look; sources differ between 10 and 20. */
export const LOW_FREQUENCY_BOUND_DB = 15;

/** The low-frequency indicator: a screening, not a finding. */
export interface LowFrequencyIndicator {
  /** LCeq − LAeq in dB. */
  differenceDb: number;
  boundDb: number;
  isAbove: boolean;
}

/**
 * LCeq − LAeq against a bound (compared in tenths, strictly above). Both must be of the same valid intervals. Null where
 * either is missing.
 */
export function lowFrequencyIndicator(
  lceqDb: number | null,
  laeqDb: number | null,
  boundDb: number = LOW_FREQUENCY_BOUND_DB,
): LowFrequencyIndicator | null {
  if (lceqDb === null || laeqDb === null) return null;
  const differenceDb = lceqDb - laeqDb;
  return { differenceDb, boundDb, isAbove: toTenths(differenceDb) > toTenths(boundDb) };
}
