import { bandSlot, bandsOf, type Band } from './bands';
import { levelOfEnergyDb } from './energy';

/** Frequency weighting: A and C by IEC 61672-1, Z none. */
export type Weighting = 'A' | 'C' | 'Z';

/** Pole frequencies in Hz and normalisations in dB at 1 kHz, IEC 61672-1:2013 Annex E. */
const F1_HZ = 20.6;
const F2_HZ = 107.7;
const F3_HZ = 737.9;
const F4_HZ = 12194;
const A_AT_1000_HZ_DB = -2.0;
const C_AT_1000_HZ_DB = -0.062;

/** A-weighting in dB at a frequency, IEC 61672-1:2013 (E.6). Give exact mid-band frequencies, not nominal ones. */
export function aWeightDb(hz: number): number {
  const f2 = hz * hz;
  const gain =
    (F4_HZ ** 2 * f2 * f2) /
    ((f2 + F1_HZ ** 2) * Math.sqrt(f2 + F2_HZ ** 2) * Math.sqrt(f2 + F3_HZ ** 2) * (f2 + F4_HZ ** 2));
  return 20 * Math.log10(gain) - A_AT_1000_HZ_DB;
}

/** C-weighting in dB at a frequency, IEC 61672-1:2013 (E.1). Give exact mid-band frequencies, not nominal ones. */
export function cWeightDb(hz: number): number {
  const f2 = hz * hz;
  const gain = (F4_HZ ** 2 * f2) / ((f2 + F1_HZ ** 2) * (f2 + F4_HZ ** 2));
  return 20 * Math.log10(gain) - C_AT_1000_HZ_DB;
}

const A_OF_SLOT_DB = bandsOf(3).map((band) => aWeightDb(band.exactHz));
const C_OF_SLOT_DB = bandsOf(3).map((band) => cWeightDb(band.exactHz));

function ofSlot(tableDb: readonly number[], index: number): number {
  const weightDb = tableDb[bandSlot(index)];
  if (weightDb === undefined) throw new RangeError(`There is no band ${index}.`);
  return weightDb;
}

/** A-weighting in dB at the exact mid-band frequency of a band index (thirds and octaves alike). */
export function aWeightOfBandDb(index: number): number {
  return ofSlot(A_OF_SLOT_DB, index);
}

/** C-weighting in dB at the exact mid-band frequency of a band index (thirds and octaves alike). */
export function cWeightOfBandDb(index: number): number {
  return ofSlot(C_OF_SLOT_DB, index);
}

/** The weighting in dB that turns an unweighted (Z) level of a band into an A, C or Z one. */
export function weightOfBandDb(index: number, weighting: Weighting): number {
  if (weighting === 'Z') return 0;
  return weighting === 'A' ? aWeightOfBandDb(index) : cWeightOfBandDb(index);
}

/**
 * Level in dB over all bands of an *unweighted* (Z) spectrum with a weighting applied once. Bands without a level (null)
 * are left out; null when none has one. Octaves give another value than thirds (+0.06 dB on traffic noise): prefer thirds.
 * @throws RangeError when levels and bands do not match.
 */
export function levelFromBandsDb(
  levelsDb: readonly (number | null)[],
  bands: readonly Pick<Band, 'index'>[],
  weighting: Weighting,
): number | null {
  if (levelsDb.length !== bands.length)
    throw new RangeError(`${levelsDb.length} levels for ${bands.length} bands.`);
  let energy = 0;
  bands.forEach((band, i) => {
    const levelDb = levelsDb[i] ?? null;
    if (levelDb !== null) energy += 10 ** ((levelDb + weightOfBandDb(band.index, weighting)) / 10);
  });
  return levelOfEnergyDb(energy);
}
