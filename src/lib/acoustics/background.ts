import { energyOfDb } from './energy';

/** Margin in dB up to which ISO 1996-2:2017 10.4 allows no correction for the residual sound. */
const NO_CORRECTION_MARGIN_DB = 3;

/** Slack for margins that binary arithmetic puts a hair above 3 dB, such as 60.4 − 57.4. */
const MARGIN_SLACK_DB = 1e-9;

/** A level freed from the residual sound, or why that cannot be done. */
export type BackgroundCorrection =
  | { kind: 'corrected'; levelDb: number }
  | {
      kind: 'refused';
      /** The residual lies within 3 dB below the measured level, or is not below it at all. */
      reason: 'within-3-db' | 'not-below';
      /** The source's level is at most this: the measured one. It may be reported as an upper bound. */
      upperBoundDb: number;
      /** What the formula gives all the same, for information only; null where it gives nothing. */
      informativeDb: number | null;
    };

/**
 * Takes the residual sound out of a measured level: 10 lg(10^(L/10) − 10^(Lr/10)), dB. Refused, never NaN, when the margin
 * L − Lr is 3 dB or less (ISO 1996-2:2017 10.4, Formula 16).
 */
export function subtractBackgroundDb(measuredDb: number, residualDb: number): BackgroundCorrection {
  const upperBoundDb = measuredDb;
  const energy = energyOfDb(measuredDb) - energyOfDb(residualDb);
  if (!(energy > 0)) return { kind: 'refused', reason: 'not-below', upperBoundDb, informativeDb: null };
  const levelDb = 10 * Math.log10(energy);
  if (measuredDb - residualDb <= NO_CORRECTION_MARGIN_DB + MARGIN_SLACK_DB) {
    return { kind: 'refused', reason: 'within-3-db', upperBoundDb, informativeDb: levelDb };
  }
  return { kind: 'corrected', levelDb };
}
