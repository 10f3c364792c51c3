import { type BandFraction } from '#lib/acoustics/bands';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { emptySums, type PeriodSums } from '#lib/acoustics/periodSums';
import { packBandEnergies, unpackBandEnergies } from './aggregatePacking';

/** The columns that quarter-hours and day periods share, except `band_energies`, in the order that `sumsOfCells` reads. */
export const SUMS_COLUMNS = [
  'valid_sec',
  'excluded_sec',
  'sample_sec',
  'is_sample_mixed',
  'a_energy_sec',
  'c_energy_sec',
  'c_valid_sec',
  'lafmax_centi_db',
  'lafmin_centi_db',
  'lcpeak_centi_db',
  'a_classes',
] as const;
/** Read only where band figures are wanted: they are most of a row. */
export const BAND_COLUMNS = ['band_fraction', 'band_energies'] as const;

/** Values of `SUMS_COLUMNS` and, where they were asked for, of `BAND_COLUMNS` after them. */
export type SumsCells = [
  validSec: number,
  excludedSec: number,
  sampleSec: number | null,
  isSampleMixed: number,
  aEnergySec: number,
  cEnergySec: number,
  cValidSec: number,
  lafmaxCentiDb: number | null,
  lafminCentiDb: number | null,
  lcpeakCentiDb: number | null,
  aClasses: Buffer,
  bandFraction?: BandFraction | null,
  bandEnergies?: Buffer,
];

/** Sums as the columns of a row to insert; distributions per band are not among them. */
export function rowOfSums(sums: PeriodSums) {
  return {
    valid_sec: sums.validSec,
    excluded_sec: sums.excludedSec,
    sample_sec: sums.sampleSec,
    is_sample_mixed: sums.isSampleMixed,
    a_energy_sec: sums.aEnergySec,
    c_energy_sec: sums.cEnergySec,
    c_valid_sec: sums.cValidSec,
    lafmax_centi_db: sums.lafmaxCentiDb,
    lafmin_centi_db: sums.lafminCentiDb,
    lcpeak_centi_db: sums.lcpeakCentiDb,
    a_classes: Buffer.from(sums.aClasses.encode()),
    band_fraction: sums.bandFraction,
    band_energies: packBandEnergies(sums),
  };
}

/** Sums of the cells of a row; without the band columns they have no band figures. */
export function sumsOfCells(cells: SumsCells): PeriodSums {
  const [
    validSec,
    excludedSec,
    sampleSec,
    isSampleMixed,
    aEnergySec,
    cEnergySec,
    cValidSec,
    lafmaxCentiDb,
    lafminCentiDb,
    lcpeakCentiDb,
    aClasses,
    bandFraction = null,
    bandEnergies,
  ] = cells;
  const bands = bandEnergies ? unpackBandEnergies(bandEnergies) : NO_BANDS;
  return {
    validSec,
    excludedSec,
    sampleSec,
    isSampleMixed: isSampleMixed === 1,
    aEnergySec,
    cEnergySec,
    cValidSec,
    lafmaxCentiDb,
    lafminCentiDb,
    lcpeakCentiDb,
    bandFraction,
    isBandFractionMixed: bands.isBandFractionMixed,
    bandEnergySec: bands.bandEnergySec,
    bandValidSec: bands.bandValidSec,
    aClasses: LevelClassCounts.decode(aClasses),
    bandClasses: null,
  };
}

/** Shared by every row that was read without bands; merging never writes to the sums it merges from. */
const { isBandFractionMixed, bandEnergySec, bandValidSec } = emptySums({ bandClasses: false });
const NO_BANDS = { isBandFractionMixed, bandEnergySec, bandValidSec };
