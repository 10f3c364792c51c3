import { bandAt, type BandFraction } from './bands';
import { toTenths } from './rounding';
import { SpectrumLevels, type LevelsOfBands } from './spectrumLevels';
import { assessTonality, type TonalAssessment } from './tonality';

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

const STANDING_OUT_BOUNDS: StandingOutBounds = { neighboursDb: 3, usualDb: 5 };

/** A mean spectrum to be examined. */
export interface ExaminedSpectrum extends LevelsOfBands {
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
  const ranges = candidatesOf(levels, tonality, bounds).map((candidate) =>
    describe(candidate, levels, spectrum.fraction),
  );
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

function describe(
  { lowerIndex, upperIndex, reasons }: Candidate,
  levels: SpectrumLevels,
  fraction: BandFraction,
): StandingOutRange {
  const levelDb = levels.levelDb(lowerIndex, upperIndex);
  if (levelDb === null) throw new RangeError(`Bands ${lowerIndex} to ${upperIndex} have no level.`);
  return {
    fromHz: bandAt(fraction, lowerIndex).lowerHz,
    toHz: bandAt(fraction, upperIndex).upperHz,
    lowerIndex,
    upperIndex,
    reasons,
    levelDb,
    excessOverNeighboursDb: levels.excessOverNeighboursDb(lowerIndex, upperIndex),
    excessOverUsualDb: levels.excessOverUsualDb(lowerIndex, upperIndex),
    aShare: levels.aShare(lowerIndex, upperIndex),
  };
}
