import { bandAt } from '#lib/acoustics/bands';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import {
  octaveEnergiesOfThirds,
  octaveEnergyBuffer,
  octaveIndexOf,
  octaveSlot,
  thirdsOfOctave,
} from '#lib/acoustics/octaves';
import { toCentiDb } from '#lib/acoustics/rounding';
import { type StripColumns } from './stripColumns';

/**
 * The same columns in octaves: the energy sum of each octave's three thirds, and none where one is missing. Only octaves
 * whose three thirds the columns have.
 */
export function octaveColumns(columns: StripColumns): StripColumns {
  const thirdIndices = Int8Array.from(columns.bands, (band) => band.index);
  const held = new Set(columns.bands.map((band) => band.index));
  const octaves = [...new Set(columns.bands.map((band) => octaveIndexOf(band.index)))]
    .filter((index) => thirdsOfOctave(index).every((third) => held.has(third)))
    .map((index) => bandAt(1, index));
  const levelsCentiDb = new Int16Array(columns.count * octaves.length).fill(NO_LEVEL_CENTI_DB);
  const energies = octaveEnergyBuffer();
  const thirds = columns.bands.length;
  for (let column = 0; column < columns.count; column += 1) {
    const levels = columns.levelsCentiDb.subarray(column * thirds, (column + 1) * thirds);
    octaveEnergiesOfThirds(levels, thirdIndices, energies);
    octaves.forEach((octave, i) => {
      const energy = energies[octaveSlot(octave.index)] ?? NaN;
      if (Number.isNaN(energy)) return;
      levelsCentiDb[column * octaves.length + i] = toCentiDb(levelOfEnergyDb(energy) ?? NaN);
    });
  }
  return { ...columns, bands: octaves, levelsCentiDb };
}
