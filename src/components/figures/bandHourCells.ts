import { bandAt, bandByNominalHz, bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import { levelFromBandsDb, weightOfBandDb, type Weighting } from '#lib/acoustics/weighting';
import type { BandHours } from '#lib/contracts/figureSheet';

/** A band with its level in each of the 24 hours, dB as weighted. */
export interface BandHourRow {
  nominalHz: number;
  label: string;
  levelsDb: (number | null)[];
}

/** The bands of a view from the lowest up. Octaves of thirds are weighted third by third. */
export function bandHourRows(held: BandHours, fraction: BandFraction, weighting: Weighting): BandHourRow[] {
  const isOctaves = fraction === 1 || held.bandFraction === 1;
  return (isOctaves ? held.octavesHz : held.bandsHz).map((nominalHz, at) => {
    const { index } = bandByNominalHz(isOctaves ? 1 : 3, nominalHz) ?? bandAt(1, 0);
    const isOfThirds = isOctaves && held.bandFraction === 3 && weighting !== 'Z';
    const levelsDb = held.hours.map((hour) => {
      if (isOfThirds) return octaveOfThirdsDb(held, hour, index, weighting);
      const levelDb = (isOctaves ? hour.octavesLeq : hour.bandsLeq)[at] ?? null;
      return levelDb === null ? null : levelDb + weightOfBandDb(index, weighting);
    });
    return { nominalHz, label: bandLabel({ nominalHz }), levelsDb };
  });
}

function octaveOfThirdsDb(
  { bandsHz }: BandHours,
  { bandsLeq }: BandHours['hours'][number],
  octaveIndex: number,
  weighting: Weighting,
): number | null {
  const thirds = thirdsOfOctave(octaveIndex).map((index) => bandAt(3, index));
  const levelsDb = thirds.map(({ nominalHz }) => bandsLeq[bandsHz.indexOf(nominalHz)] ?? null);
  return levelsDb.includes(null) ? null : levelFromBandsDb(levelsDb, thirds, weighting);
}

/** The loudest band and hour of some rows; null where nothing was measured. */
export function loudestBandHour(
  rows: readonly BandHourRow[],
): { label: string; hour: number; levelDb: number } | null {
  const cells = rows.flatMap(({ label, levelsDb }) =>
    levelsDb.flatMap((levelDb, hour) => (levelDb === null ? [] : [{ label, hour, levelDb }])),
  );
  return cells.toSorted((a, b) => b.levelDb - a.levelDb)[0] ?? null;
}
