import { bandAt, bandSlot, type Band, type BandFraction } from './bands';
import { levelOfEnergyDb } from './energy';
import { toTenths } from './rounding';
import { assessTonality, type TonalAssessment } from './tonality';
import { aWeightOfBandDb } from './weighting';

/** Why a range stands out: a tone, a tone split over two thirds, louder than both neighbours, louder than usual. */
export type StandingOutReason = 'tone' | 'tone-on-edge' | 'above-neighbours' | 'above-usual';

/** A range of frequencies that stands out of a spectrum. A band tells a range, not a frequency: say so. */
export interface StandingOutRange {
  /** Edges of the range in Hz: lower edge of its lowest band to upper edge of its highest. */
  fromHz: number;
  toHz: number;
  lowerIndex: number;
  upperIndex: number;
  reasons: StandingOutReason[];
  /** Unweighted level of the range, dB. */
  levelDb: number;
  /** Above the louder of both outer neighbours, dB; null where one is missing. */
  excessOverNeighboursDb: number | null;
  /** Above the usual level of the same bands, dB; null where that is not known. */
  excessOverUsualDb: number | null;
  /** Part of the whole spectrum's A-weighted energy that lies in the range, 0–1. */
  aShare: number;
}

/** Excesses in dB from which a band stands out. The figures are Bittern's own. */
export interface StandingOutBounds {
  neighboursDb: number;
  usualDb: number;
}

export const STANDING_OUT_BOUNDS: StandingOutBounds = { neighboursDb: 3, usualDb: 5 };

/** An unweighted mean spectrum, levels in dB beside bands (null = none), with the usual levels of the same bands if known. */
export interface ExaminedSpectrum {
  fraction: BandFraction;
  bands: readonly Pick<Band, 'index'>[];
  levelsDb: readonly (number | null)[];
  usualDb?: readonly (number | null)[];
  /** Seconds of valid data that the spectrum is the mean of. */
  averagedSec: number;
}

/** What stands out of a spectrum, most telling first, and what the tonal methods say about it. */
export interface StandingOut {
  tonality: TonalAssessment;
  ranges: StandingOutRange[];
}

interface Candidate {
  lowerIndex: number;
  upperIndex: number;
  reasons: StandingOutReason[];
}

const ORDER: readonly StandingOutReason[] = ['tone', 'tone-on-edge', 'above-neighbours', 'above-usual'];

/**
 * Finds what stands out of a spectrum: tones by the survey method and by adjacent pairs, bands above both neighbours, and
 * bands above their usual level (adjacent ones together as one range). Differences are compared in tenths.
 */
export function standingOut(
  spectrum: ExaminedSpectrum,
  bounds: StandingOutBounds = STANDING_OUT_BOUNDS,
): StandingOut {
  const levels = new SpectrumLevels(spectrum);
  const tonality = assessTonality(spectrum.fraction, spectrum.levelsDb, spectrum.bands, spectrum.averagedSec);
  const ranges = candidatesOf(levels, tonality, bounds).map((candidate) => levels.describe(candidate));
  return { tonality, ranges: ranges.sort(byTelling) };
}

function candidatesOf(
  levels: SpectrumLevels,
  tonality: TonalAssessment,
  bounds: StandingOutBounds,
): Candidate[] {
  const candidates: Candidate[] = [];
  const taken = new Set<number>();
  for (const { method, lowerIndex, upperIndex } of tonality.kind === 'assessed' ? tonality.findings : []) {
    const reasons: StandingOutReason[] = [method === 'survey' ? 'tone' : 'tone-on-edge'];
    candidates.push({ lowerIndex, upperIndex, reasons });
    for (let index = lowerIndex; index <= upperIndex; index += 1) taken.add(index);
  }
  for (const index of levels.indices) {
    if (taken.has(index) || !reaches(levels.excessOverNeighboursDb(index, index), bounds.neighboursDb))
      continue;
    candidates.push({ lowerIndex: index, upperIndex: index, reasons: ['above-neighbours'] });
    taken.add(index);
  }
  for (const candidate of candidates) {
    const excessDb = levels.excessOverUsualDb(candidate.lowerIndex, candidate.upperIndex);
    if (reaches(excessDb, bounds.usualDb)) candidate.reasons.push('above-usual');
  }
  let run: Candidate | null = null;
  for (const index of levels.indices) {
    if (taken.has(index) || !reaches(levels.excessOverUsualDb(index, index), bounds.usualDb)) continue;
    if (run && run.upperIndex + levels.step === index) {
      run.upperIndex = index;
    } else {
      run = { lowerIndex: index, upperIndex: index, reasons: ['above-usual'] };
      candidates.push(run);
    }
  }
  return candidates;
}

function reaches(excessDb: number | null, boundDb: number): boolean {
  return excessDb !== null && toTenths(excessDb) >= toTenths(boundDb);
}

function byTelling(a: StandingOutRange, b: StandingOutRange): number {
  const rank = (range: StandingOutRange) => Math.min(...range.reasons.map((reason) => ORDER.indexOf(reason)));
  const excessDb = (range: StandingOutRange) =>
    Math.max(range.excessOverNeighboursDb ?? -Infinity, range.excessOverUsualDb ?? -Infinity);
  return rank(a) - rank(b) || excessDb(b) - excessDb(a);
}

/** Levels of one spectrum by band index, and sums and differences over ranges of them. */
class SpectrumLevels {
  /** Distance of adjacent band indices. */
  readonly step: number;
  /** Band indices that have a level, ascending. */
  readonly indices: number[];
  readonly #fraction: BandFraction;
  readonly #levelDb = new Map<number, number>();
  readonly #usualDb = new Map<number, number>();

  constructor({ fraction, bands, levelsDb, usualDb }: ExaminedSpectrum) {
    this.#fraction = fraction;
    this.step = fraction === 3 ? 1 : 3;
    bands.forEach(({ index }, i) => {
      const levelDb = levelsDb[i] ?? null;
      const usualLevelDb = usualDb?.[i] ?? null;
      if (levelDb !== null) this.#levelDb.set(index, levelDb);
      if (usualLevelDb !== null) this.#usualDb.set(index, usualLevelDb);
    });
    this.indices = [...this.#levelDb.keys()].sort((a, b) => bandSlot(a) - bandSlot(b));
  }

  excessOverNeighboursDb(lowerIndex: number, upperIndex: number): number | null {
    const below = this.#levelDb.get(lowerIndex - this.step);
    const above = this.#levelDb.get(upperIndex + this.step);
    const levelDb = this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
    return below === undefined || above === undefined || levelDb === null
      ? null
      : levelDb - Math.max(below, above);
  }

  excessOverUsualDb(lowerIndex: number, upperIndex: number): number | null {
    const levelDb = this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
    const usualDb = this.#sumDb(this.#usualDb, lowerIndex, upperIndex);
    return levelDb === null || usualDb === null ? null : levelDb - usualDb;
  }

  describe({ lowerIndex, upperIndex, reasons }: Candidate): StandingOutRange {
    const levelDb = this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
    if (levelDb === null) throw new RangeError(`Bands ${lowerIndex} to ${upperIndex} have no level.`);
    return {
      fromHz: bandAt(this.#fraction, lowerIndex).lowerHz,
      toHz: bandAt(this.#fraction, upperIndex).upperHz,
      lowerIndex,
      upperIndex,
      reasons,
      levelDb,
      excessOverNeighboursDb: this.excessOverNeighboursDb(lowerIndex, upperIndex),
      excessOverUsualDb: this.excessOverUsualDb(lowerIndex, upperIndex),
      aShare: this.#aEnergy(lowerIndex, upperIndex) / this.#aEnergy(-Infinity, Infinity),
    };
  }

  #sumDb(levelsDb: ReadonlyMap<number, number>, lowerIndex: number, upperIndex: number): number | null {
    let energy = 0;
    for (let index = lowerIndex; index <= upperIndex; index += this.step) {
      const levelDb = levelsDb.get(index);
      if (levelDb === undefined) return null;
      energy += 10 ** (levelDb / 10);
    }
    return levelOfEnergyDb(energy);
  }

  #aEnergy(lowerIndex: number, upperIndex: number): number {
    let energy = 0;
    for (const [index, levelDb] of this.#levelDb) {
      if (lowerIndex <= index && index <= upperIndex)
        energy += 10 ** ((levelDb + aWeightOfBandDb(index)) / 10);
    }
    return energy;
  }
}
