import { bandAt, bandsOf, bandSlot, BAND_SLOTS, FIRST_BAND_INDEX, type Band } from './bands';
import { energyOfCentiDb, energyOfDb, levelOfEnergyDb } from './energy';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { toCentiDb } from './rounding';

/** Number of octaves, for arrays addressed by `octaveSlot`. */
export const OCTAVE_SLOTS = bandsOf(1).length;

/** Index of the octave that a third belongs to: −4, −3 and −2 to −3 (500 Hz). */
export function octaveIndexOf(thirdIndex: number): number {
  return 3 * Math.round(thirdIndex / 3) + 0; // + 0: never −0
}

/** Place of an octave's band index in arrays of `OCTAVE_SLOTS`. */
export function octaveSlot(octaveIndex: number): number {
  return (octaveIndex - (bandsOf(1)[0]?.index ?? 0)) / 3;
}

/** Band indices of an octave's three thirds, ascending. */
export function thirdsOfOctave(octaveIndex: number): [number, number, number] {
  return [octaveIndex - 1, octaveIndex, octaveIndex + 1];
}

/** Octave levels beside their bands, ascending. */
export interface OctaveLevels {
  bands: Band[];
  /** dB; null where one of the three thirds is missing, because a part of an octave is not its level. */
  levelsDb: (number | null)[];
}

/**
 * Octave levels in dB from third-octave levels in dB: the energy sum of each octave's three thirds, whose outer edges are
 * the octave's in base ten (IEC 61260-1), so without any correction. Every octave that some third of `bands` belongs to.
 * @throws RangeError when levels and bands do not match.
 */
export function octavesFromThirdsDb(
  levelsDb: readonly (number | null)[],
  bands: readonly Pick<Band, 'index'>[],
): OctaveLevels {
  if (levelsDb.length !== bands.length)
    throw new RangeError(`${levelsDb.length} levels for ${bands.length} bands.`);
  const levelOfThird = new Map(bands.map((band, i) => [band.index, levelsDb[i] ?? null]));
  const octaveIndices = [...new Set(bands.map((band) => octaveIndexOf(band.index)))].sort((a, b) => a - b);
  return {
    bands: octaveIndices.map((index) => bandAt(1, index)),
    levelsDb: octaveIndices.map((index) =>
      sumOfThirdsDb(thirdsOfOctave(index).map((n) => levelOfThird.get(n) ?? null)),
    ),
  };
}

function sumOfThirdsDb(levelsDb: readonly (number | null)[]): number | null {
  let energy = 0;
  for (const levelDb of levelsDb) {
    if (levelDb === null) return null;
    energy += energyOfDb(levelDb);
  }
  return levelOfEnergyDb(energy);
}

/** Octave's slot by the slot of each of its thirds: worked out once, because every third of every interval is looked up. */
const OCTAVE_SLOT_OF_BAND = Uint8Array.from({ length: BAND_SLOTS }, (_, slot) =>
  octaveSlot(octaveIndexOf(FIRST_BAND_INDEX + slot)),
);

/** Energies of octaves by `octaveSlot`; NaN where a third is missing. A buffer that is filled again for each interval. */
export type OctaveEnergies = Float64Array;

/** Filled again for each interval, as `into` is. */
const thirdsSeen = new Uint8Array(OCTAVE_SLOTS);

/** An empty buffer for `octaveEnergiesOfThirds`. */
export function octaveEnergyBuffer(): OctaveEnergies {
  return new Float64Array(OCTAVE_SLOTS);
}

/**
 * Energies of the octaves of one interval from its stored third-octave levels (hundredths of a dB, beside `thirdIndices`),
 * written into `into`.
 */
export function octaveEnergiesOfThirds(
  levelsCentiDb: Int16Array,
  thirdIndices: Int8Array,
  into: OctaveEnergies,
): void {
  thirdsSeen.fill(0);
  into.fill(0);
  for (let i = 0; i < levelsCentiDb.length; i += 1) {
    const centiDb = levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
    if (centiDb === NO_LEVEL_CENTI_DB) continue;
    const slot = OCTAVE_SLOT_OF_BAND[bandSlot(thirdIndices[i] ?? 0)] ?? 0;
    into[slot] = (into[slot] ?? 0) + energyOfCentiDb(centiDb);
    thirdsSeen[slot] = (thirdsSeen[slot] ?? 0) + 1;
  }
  for (let slot = 0; slot < OCTAVE_SLOTS; slot += 1) if (thirdsSeen[slot] !== 3) into[slot] = NaN;
}

/** Octave levels of one interval in hundredths of a dB (half up; −32768 = none) for every octave in ascending order. */
export function octavesFromThirdsCentiDb(levelsCentiDb: Int16Array, thirdIndices: Int8Array): Int16Array {
  const energies = octaveEnergyBuffer();
  octaveEnergiesOfThirds(levelsCentiDb, thirdIndices, energies);
  return Int16Array.from(energies, (energy) =>
    Number.isNaN(energy) ? NO_LEVEL_CENTI_DB : toCentiDb(levelOfEnergyDb(energy) ?? NaN),
  );
}
