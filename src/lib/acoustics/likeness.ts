import { BAND_SLOTS } from './bands';

/** Thirds that two spectra must share before they are compared. */
export const MINIMUM_SHARED_THIRDS = 12;

/** How alike two spectra are. */
export interface Likeness {
  /** RMS difference in dB between both shapes; small is alike. */
  rmsDb: number;
  /** Thirds that both have. */
  sharedBands: number;
}

/**
 * Spectral likeness of two third-octave spectra, levels in dB by `bandSlot` (null = none): the RMS difference over the thirds that
 * both have, after taking out each one's mean, so that it is the shape that is compared, not how loud it is. That is defined
 * on A-weighted levels; the same weight on both sides cancels in the difference, so Z levels give the same answer. Null below
 * 12 shared thirds.
 */
export function spectralLikeness(
  aLevelsDb: readonly (number | null)[],
  bLevelsDb: readonly (number | null)[],
): Likeness | null {
  const differencesDb: number[] = [];
  for (let slot = 0; slot < BAND_SLOTS; slot += 1) {
    const aDb = aLevelsDb[slot] ?? null;
    const bDb = bLevelsDb[slot] ?? null;
    if (aDb !== null && bDb !== null) differencesDb.push(aDb - bDb);
  }
  const sharedBands = differencesDb.length;
  if (sharedBands < MINIMUM_SHARED_THIRDS) return null;
  const meanDb = differencesDb.reduce((sum, d) => sum + d, 0) / sharedBands;
  const meanSquare = differencesDb.reduce((sum, d) => sum + (d - meanDb) ** 2, 0) / sharedBands;
  return { rmsDb: Math.sqrt(meanSquare), sharedBands };
}
