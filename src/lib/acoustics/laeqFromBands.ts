import { bandRange, type BandFraction } from './bands';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { energyOfCentiDb, energyOfDb, levelOfEnergyDb } from './energy';
import { aWeightOfBandDb } from './weighting';

/** The bands without which an LAeq cannot be told from a spectrum: thirds 50 Hz–8 kHz, octaves 63 Hz–8 kHz. */
const NEEDED_INDICES: Readonly<Record<BandFraction, readonly number[]>> = {
  3: bandRange(3, 50, 8000).map((band) => band.index),
  1: bandRange(1, 63, 8000).map((band) => band.index),
};

/**
 * LAeq in dB computed from one interval's stored, unweighted band levels (hundredths of a dB beside `bandIndices`): the energy
 * sum of all of them, A-weighted at exact mid-band frequencies. Null unless thirds cover 50 Hz–8 kHz or octaves 63 Hz–8 kHz
 * without a gap.
 */
export function laeqFromBandsDb(
  fraction: BandFraction,
  levelsCentiDb: Int16Array,
  bandIndices: Int8Array,
): number | null {
  const present = new Set<number>();
  let energy = 0;
  bandIndices.forEach((bandIndex, i) => {
    const centiDb = levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
    if (centiDb === NO_LEVEL_CENTI_DB) return;
    present.add(bandIndex);
    energy += energyOfCentiDb(centiDb) * energyOfDb(aWeightOfBandDb(bandIndex));
  });
  return NEEDED_INDICES[fraction].every((index) => present.has(index)) ? levelOfEnergyDb(energy) : null;
}
