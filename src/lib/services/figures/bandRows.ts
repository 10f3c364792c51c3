import { bandLabel, bandSlot } from '#lib/acoustics/bands';
import { type LevelClassCounts } from '#lib/acoustics/classCounts';
import { energyOfDb } from '#lib/acoustics/energy';
import { octaveSlot, thirdsOfOctave } from '#lib/acoustics/octaves';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { aWeightOfBandDb } from '#lib/acoustics/weighting';
import { type BandRow } from '#lib/contracts/figureSheet';
import { coveredOf, type SheetSource } from './source';
import { fractionOf, stationBands, stationOctaves, type PlacedBand } from './stationBands';

/** Figures of the station's own bands. */
export function bandRows(source: SheetSource, levels: PeriodAccumulator): BandRow[] {
  const bands = stationBands(source.station, levels);
  const rows = bands.map(({ index, slot, nominalHz }) => {
    const Leq = levels.bandLeqDb(index);
    return {
      nominalHz,
      label: bandLabel({ nominalHz }),
      Leq,
      L10: levels.bandExceedanceLevelDb(index, 10),
      L50: levels.bandExceedanceLevelDb(index, 50),
      L90: levels.bandExceedanceLevelDb(index, 90),
      highest: highestDb(levels.sums.bandClasses?.bands[slot]),
      aLeq: Leq === null ? null : Leq + aWeightOfBandDb(index),
      ...coveredOf(source, source.period, levels.sums.bandValidSec[slot] ?? 0),
    };
  });
  return withShares(rows);
}

/** Figures of octaves; of a one-third-octave station sums of three thirds, A-weighted third by third. */
export function octaveRows(source: SheetSource, levels: PeriodAccumulator): BandRow[] {
  if (fractionOf(source.station, levels) === 1) return bandRows(source, levels);
  const rows = stationOctaves(source.station, levels).map((band) => octaveRow(source, levels, band));
  return withShares(rows);
}

function octaveRow(source: SheetSource, levels: PeriodAccumulator, { index, nominalHz }: PlacedBand) {
  const thirds = thirdsOfOctave(index);
  const validSec = Math.min(...thirds.map((third) => levels.sums.bandValidSec[bandSlot(third)] ?? 0));
  return {
    nominalHz,
    label: bandLabel({ nominalHz }),
    Leq: levels.octaveLeqDb(index),
    L10: levels.octaveExceedanceLevelDb(index, 10),
    L50: levels.octaveExceedanceLevelDb(index, 50),
    L90: levels.octaveExceedanceLevelDb(index, 90),
    highest: highestDb(levels.sums.bandClasses?.octaves[octaveSlot(index)]),
    aLeq: aWeightedOctaveDb(levels, thirds),
    ...coveredOf(source, source.period, validSec),
  };
}

function aWeightedOctaveDb(levels: PeriodAccumulator, thirds: readonly number[]): number | null {
  let energy = 0;
  for (const third of thirds) {
    const levelDb = levels.bandLeqDb(third);
    if (levelDb === null) return null;
    energy += energyOfDb(levelDb + aWeightOfBandDb(third));
  }
  return 10 * Math.log10(energy);
}

function withShares(rows: readonly Omit<BandRow, 'aShare'>[]): BandRow[] {
  const energyOf = (aLeq: number | null) => (aLeq === null ? 0 : energyOfDb(aLeq));
  const total = rows.reduce((sum, { aLeq }) => sum + energyOf(aLeq), 0);
  return rows.map((row) => ({ ...row, aShare: row.aLeq === null ? null : energyOf(row.aLeq) / total }));
}

/** The loudest class that occurs: the highest level of one base interval, in whole tenths. */
function highestDb(counts: LevelClassCounts | undefined): number | null {
  let highest: number | null = null;
  for (const [tenths] of counts?.entries() ?? []) highest = tenths / 10;
  return highest;
}
