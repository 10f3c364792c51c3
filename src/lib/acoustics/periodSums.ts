import { BAND_SLOTS, type BandFraction } from './bands';
import { LevelClassCounts } from './classCounts';
import { OCTAVE_SLOTS } from './octaves';

/** Class counts of bands by `bandSlot`, and of the octaves of a third-octave station by `octaveSlot`. */
export interface BandClassCounts {
  bands: LevelClassCounts[];
  octaves: LevelClassCounts[];
}

/** What a period's figures are made of. Everything adds up: the sums of two periods are the sums of both together. */
export interface PeriodSums {
  validSec: number;
  /** Seconds of intervals that validity rules or an exclusion leave out. */
  excludedSec: number;
  /** Sum over valid seconds of 10^(LAeq/10). */
  aEnergySec: number;
  /** Sum of 10^(LCeq/10) over the `cValidSec` valid seconds that have an LCeq. */
  cEnergySec: number;
  cValidSec: number;
  /** Highest LAFmax, lowest LAFmin and highest LCpeak of valid intervals; null where none has one. */
  lafmaxCentiDb: number | null;
  lafminCentiDb: number | null;
  lcpeakCentiDb: number | null;
  /** Length of the monitor's own valid intervals, before any clipping; null when there are none or lengths are mixed. */
  sampleSec: number | null;
  isSampleMixed: boolean;
  /** Null when no bands, or when octaves and thirds both occur: then there are no band figures. */
  bandFraction: BandFraction | null;
  isBandFractionMixed: boolean;
  /** By `bandSlot`: sum of 10^(L/10) over the band's own valid seconds, which are in `bandValidSec`. */
  bandEnergySec: Float64Array;
  bandValidSec: Float64Array;
  /** Distribution of LAeq over the valid seconds. */
  aClasses: LevelClassCounts;
  /** Distributions per band; null where they were not counted. */
  bandClasses: BandClassCounts | null;
}

/** Empty distributions for every band and octave. */
export function emptyBandClasses(): BandClassCounts {
  return {
    bands: Array.from({ length: BAND_SLOTS }, () => new LevelClassCounts()),
    octaves: Array.from({ length: OCTAVE_SLOTS }, () => new LevelClassCounts()),
  };
}

/** Sums of nothing. */
export function emptySums(options: { bandClasses: boolean }): PeriodSums {
  return {
    validSec: 0,
    excludedSec: 0,
    aEnergySec: 0,
    cEnergySec: 0,
    cValidSec: 0,
    lafmaxCentiDb: null,
    lafminCentiDb: null,
    lcpeakCentiDb: null,
    sampleSec: null,
    isSampleMixed: false,
    bandFraction: null,
    isBandFractionMixed: false,
    bandEnergySec: new Float64Array(BAND_SLOTS),
    bandValidSec: new Float64Array(BAND_SLOTS),
    aClasses: new LevelClassCounts(),
    bandClasses: options.bandClasses ? emptyBandClasses() : null,
  };
}

function highest(a: number | null, b: number | null): number | null {
  if (a === null || b === null) return a ?? b;
  return Math.max(a, b);
}

function lowest(a: number | null, b: number | null): number | null {
  if (a === null || b === null) return a ?? b;
  return Math.min(a, b);
}

/** Notes the extremes of some valid data. */
export function noteExtremes(
  sums: PeriodSums,
  of: Pick<PeriodSums, 'lafmaxCentiDb' | 'lafminCentiDb' | 'lcpeakCentiDb'>,
): void {
  sums.lafmaxCentiDb = highest(sums.lafmaxCentiDb, of.lafmaxCentiDb);
  sums.lafminCentiDb = lowest(sums.lafminCentiDb, of.lafminCentiDb);
  sums.lcpeakCentiDb = highest(sums.lcpeakCentiDb, of.lcpeakCentiDb);
}

/** Notes the length of base samples; once lengths differ there is no one length any more. */
export function noteSampleSec(sums: PeriodSums, sampleSec: number | null, isMixed: boolean): void {
  const differs = sums.sampleSec !== null && sampleSec !== null && sums.sampleSec !== sampleSec;
  sums.isSampleMixed = sums.isSampleMixed || isMixed || differs;
  sums.sampleSec = sums.isSampleMixed ? null : (sums.sampleSec ?? sampleSec);
}

/**
 * Notes which kind of bands some data have. Octaves and thirds share band indices but are different quantities: once both
 * occur, the band sums are dropped and stay empty, whatever order things come in. Says whether bands may be summed.
 */
export function noteBandFraction(sums: PeriodSums, fraction: BandFraction | null, isMixed: boolean): boolean {
  if (sums.isBandFractionMixed) return false;
  const differs = sums.bandFraction !== null && fraction !== null && sums.bandFraction !== fraction;
  if (!isMixed && !differs) {
    sums.bandFraction ??= fraction;
    return fraction !== null;
  }
  sums.isBandFractionMixed = true;
  sums.bandFraction = null;
  sums.bandEnergySec.fill(0);
  sums.bandValidSec.fill(0);
  if (sums.bandClasses) sums.bandClasses = emptyBandClasses();
  return false;
}

function addEach(into: Float64Array, from: Float64Array): void {
  for (let i = 0; i < into.length; i += 1) into[i] = (into[i] ?? 0) + (from[i] ?? 0);
}

function mergeClasses(sums: PeriodSums, other: PeriodSums): void {
  if (!sums.bandClasses) return;
  if (other.bandClasses === null) {
    sums.bandClasses = null;
    return;
  }
  const { bands, octaves } = other.bandClasses;
  sums.bandClasses.bands.forEach((counts, slot) => counts.merge(bands[slot] ?? new LevelClassCounts()));
  sums.bandClasses.octaves.forEach((counts, slot) => counts.merge(octaves[slot] ?? new LevelClassCounts()));
}

/**
 * Adds another period's sums. In any order and grouping the result is that of the whole. Distributions per band survive
 * only when every part that has band levels has them.
 */
export function mergeSums(sums: PeriodSums, other: PeriodSums): void {
  sums.validSec += other.validSec;
  sums.excludedSec += other.excludedSec;
  sums.aEnergySec += other.aEnergySec;
  sums.cEnergySec += other.cEnergySec;
  sums.cValidSec += other.cValidSec;
  noteExtremes(sums, other);
  noteSampleSec(sums, other.sampleSec, other.isSampleMixed);
  sums.aClasses.merge(other.aClasses);
  if (noteBandFraction(sums, other.bandFraction, other.isBandFractionMixed)) {
    addEach(sums.bandEnergySec, other.bandEnergySec);
    addEach(sums.bandValidSec, other.bandValidSec);
    mergeClasses(sums, other);
  }
}
