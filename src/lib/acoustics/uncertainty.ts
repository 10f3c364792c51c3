import { toCentiDb } from './rounding';

/** Standard uncertainty in dB of a class 1 instrument (ISO 1996-2:2017, from memory; class 2 has 1.5 dB). */
export const CLASS_1_UNCERTAINTY_DB = 0.5;

/** Calibration drift in dB above which data since the last good check are doubtful; practice is 0.5–1.0 dB. */
const DRIFT_BOUND_DB = 0.5;

/** A dB per relative energy: 10/ln 10. */
const DB_PER_RELATIVE_ENERGY = 10 / Math.LN10;

/** Standard uncertainty u, its expansion U = 2u (95 %), and the terms it is made of, all dB. */
export interface Uncertainty {
  uDb: number;
  expandedDb: number;
  terms: { instrumentDb: number; driftDb: number; coverageDb: number };
}

/** Root sum of squares of standard uncertainties in dB (ISO 1996-2:2017, sensitivities already applied). */
export function combinedUncertaintyDb(termsDb: readonly number[]): number {
  return Math.hypot(...termsDb);
}

/**
 * Standard uncertainty in dB that gaps bring into a period's level; Bittern's own term: 4.34·s/(Ē·√n)·√(1 − c) over the n
 * hourly energies (mean Ē, sample standard deviation s) with coverage c. Assumes that gaps fall at random, which must be said
 * where it is shown. 0 with full coverage; null with gaps and fewer than two hours, from which no spread can be told.
 */
export function coverageUncertaintyDb(hourlyEnergies: readonly number[], coverage: number): number | null {
  if (!(coverage >= 0 && coverage <= 1)) throw new RangeError(`${coverage} is not a coverage from 0 to 1.`);
  if (coverage === 1) return 0;
  const n = hourlyEnergies.length;
  const mean = hourlyEnergies.reduce((sum, energy) => sum + energy, 0) / n;
  if (n < 2 || !(mean > 0)) return null;
  const variance = hourlyEnergies.reduce((sum, energy) => sum + (energy - mean) ** 2, 0) / (n - 1);
  return ((DB_PER_RELATIVE_ENERGY * Math.sqrt(variance)) / (mean * Math.sqrt(n))) * Math.sqrt(1 - coverage);
}

/**
 * Uncertainty of a period's level from instrument class, calibration drift (its magnitude counts in full, which is on
 * the safe side) and coverage; null when the coverage term cannot be told.
 */
export function periodUncertainty(terms: {
  instrumentDb: number;
  driftDb: number;
  coverageDb: number | null;
}): Uncertainty | null {
  const { instrumentDb, coverageDb } = terms;
  if (coverageDb === null) return null;
  const driftDb = Math.abs(terms.driftDb);
  const uDb = combinedUncertaintyDb([instrumentDb, driftDb, coverageDb]);
  return { uDb, expandedDb: 2 * uDb, terms: { instrumentDb, driftDb, coverageDb } };
}

/** Whether a calibration drift makes the data since the last good check doubtful: above the bound, in hundredths of a dB. */
export function isDriftDoubtful(driftDb: number, boundDb: number = DRIFT_BOUND_DB): boolean {
  return toCentiDb(Math.abs(driftDb)) > toCentiDb(boundDb);
}
