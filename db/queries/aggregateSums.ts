import { type BandFraction } from '#lib/acoustics/bands';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { emptySums, type PeriodSums } from '#lib/acoustics/periodSums';
import { ByteWriter } from '#lib/acoustics/varint';
import { packBandEnergies, unpackBandEnergies, type BandRoom } from './aggregatePacking';
import { type Cell } from './preparedInsert';

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

/** Values of `SUMS_COLUMNS` and then `BAND_COLUMNS`; distributions per band are not among them. */
export function cellsOfSums(sums: PeriodSums): Cell[] {
  return [
    sums.validSec,
    sums.excludedSec,
    sums.sampleSec,
    sums.isSampleMixed ? 1 : 0,
    sums.aEnergySec,
    sums.cEnergySec,
    sums.cValidSec,
    sums.lafmaxCentiDb,
    sums.lafminCentiDb,
    sums.lcpeakCentiDb,
    bytesOfClasses(sums.aClasses),
    sums.bandFraction,
    packBandEnergies(sums),
  ];
}

/** Emptied before each use: a buffer of its own for every row costs more than what is written into it. */
const writer = new ByteWriter();

function bytesOfClasses(counts: LevelClassCounts): Buffer {
  writer.length = 0;
  counts.encodeInto(writer);
  return Buffer.from(writer.bytes.subarray(0, writer.length));
}

/** An instant as a cell of a DATETIME(3), in UTC. */
export function instantCell(instant: Date): string {
  return instant.toISOString().slice(0, -1).replace('T', ' ');
}

/** Sums of the cells of a row; without the band columns they have no band figures. `room`: zeros to read its bands into. */
export function sumsOfCells(cells: SumsCells, room?: BandRoom): PeriodSums {
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
  const bands = bandEnergies ? unpackBandEnergies(bandEnergies, room) : NO_BANDS;
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
    aClasses: LevelClassCounts.encoded(aClasses),
    bandClasses: null,
  };
}

/** Shared by every row that was read without bands; merging never writes to the sums it merges from. */
const { isBandFractionMixed, bandEnergySec, bandValidSec } = emptySums({ bandClasses: false });
const NO_BANDS = { isBandFractionMixed, bandEnergySec, bandValidSec };
