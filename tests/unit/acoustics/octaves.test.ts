import { describe, expect, test } from 'vitest';
import { bandRange, bandsOf } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import {
  octaveIndexOf,
  octavesFromThirdsCentiDb,
  octavesFromThirdsDb,
  octaveSlot,
  OCTAVE_SLOTS,
  thirdsOfOctave,
} from '#lib/acoustics/octaves';

describe('octaves from thirds', () => {
  test('every third belongs to the octave that lists it', () => {
    for (const octave of bandsOf(1)) {
      expect(thirdsOfOctave(octave.index).map(octaveIndexOf)).toEqual([
        octave.index,
        octave.index,
        octave.index,
      ]);
    }
    expect(bandsOf(1).map((octave) => octaveSlot(octave.index))).toEqual([...Array(OCTAVE_SLOTS).keys()]);
  });

  test('the energy sum of three; null when one is missing or was not measured', () => {
    const bands = bandRange(3, 80, 400);
    const levelsDb = [50, 50, 50, 50, 60, 60, null, 40];
    const octaves = octavesFromThirdsDb(levelsDb, bands);
    expect(octaves.bands.map((band) => band.nominalHz)).toEqual([63, 125, 250, 500]);
    expect(octaves.levelsDb[0]).toBeNull();
    expect(octaves.levelsDb[1]).toBeCloseTo(50 + 10 * Math.log10(3), 9);
    expect(octaves.levelsDb.slice(2)).toEqual([null, null]);
    expect(() => octavesFromThirdsDb([50], bands)).toThrow(RangeError);
  });

  test('stored levels: rounded half up to hundredths once, from exact energies', () => {
    const thirds = bandRange(3, 100, 400);
    const indices = Int8Array.from(thirds, (band) => band.index);
    const levels = Int16Array.from([5000, 5000, 5000, 6000, NO_LEVEL_CENTI_DB, 6000, 4000]);
    const octaves = octavesFromThirdsCentiDb(levels, indices);
    expect(octaves).toHaveLength(OCTAVE_SLOTS);
    expect(octaves[octaveSlot(-9)]).toBe(5477);
    expect([...octaves].filter((centiDb) => centiDb !== NO_LEVEL_CENTI_DB)).toEqual([5477]);
  });
});
