import { BAND_SLOTS, bandSlot, FIRST_BAND_INDEX, type Band, type BandFraction } from './bands';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { centiDbToTenths, toTenths } from './rounding';

/**
 * How a tone was found. `survey`: ISO 1996-2:2017 Annex K, a third above both neighbours. `adjacent-pair`: Bittern's own
 * addition for a tone on the edge of two thirds. `averaged-neighbours`: against the arithmetic mean of both neighbours, a
 * variant of other standards.
 */
export type TonalMethod = 'survey' | 'adjacent-pair' | 'averaged-neighbours';

/** One third, or a pair of adjacent thirds, that a method calls tonal. */
export interface TonalFinding {
  method: TonalMethod;
  /** Band indices of the lowest and highest third of the finding; equal for a single third. */
  lowerIndex: number;
  upperIndex: number;
  /** By how much it exceeds the louder neighbour (for `averaged-neighbours`: their mean), in tenths of a dB (or half ones). */
  excessTenths: number;
  /** What it had to reach. */
  thresholdTenths: number;
}

/** Third-octave levels of one unweighted spectrum in integer tenths of a dB by `bandSlot`; null = none. */
export type ThirdsTenths = readonly (number | null)[];

/** Thresholds in tenths by range of band index: 25–125 Hz, 160–400 Hz, 500 Hz–10 kHz (ISO 1996-2:2017 Annex K). */
const THRESHOLDS = [
  { fromIndex: -16, toIndex: -9, tenths: 150 },
  { fromIndex: -8, toIndex: -4, tenths: 80 },
  { fromIndex: -3, toIndex: 10, tenths: 50 },
] as const;

const THRESHOLD_OF_SLOT: readonly (number | null)[] = Array.from({ length: BAND_SLOTS }, (_, slot) => {
  const index = slot + FIRST_BAND_INDEX;
  return THRESHOLDS.find(({ fromIndex, toIndex }) => fromIndex <= index && index <= toIndex)?.tenths ?? null;
});

/** What a third must exceed its neighbours by, in tenths of a dB; null for bands that the method does not test. */
export function tonalThresholdTenths(bandIndex: number): number | null {
  return THRESHOLD_OF_SLOT[bandSlot(bandIndex)] ?? null;
}

/** A spectrum in the form that the tests take, from levels in dB (rounded half up) beside their thirds. */
export function thirdsTenthsOfDb(
  levelsDb: readonly (number | null)[],
  bands: readonly Pick<Band, 'index'>[],
): (number | null)[] {
  const tenths = new Array<number | null>(BAND_SLOTS).fill(null);
  bands.forEach((band, i) => {
    const levelDb = levelsDb[i] ?? null;
    tenths[bandSlot(band.index)] = levelDb === null ? null : toTenths(levelDb);
  });
  return tenths;
}

/** A spectrum in the form that the tests take, from one interval's stored levels beside its band indices. */
export function thirdsTenthsOfCentiDb(levelsCentiDb: Int16Array, bandIndices: Int8Array): (number | null)[] {
  const tenths = new Array<number | null>(BAND_SLOTS).fill(null);
  for (let i = 0; i < levelsCentiDb.length; i += 1) {
    const centiDb = levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
    if (centiDb !== NO_LEVEL_CENTI_DB) tenths[bandSlot(bandIndices[i] ?? NaN)] = centiDbToTenths(centiDb);
  }
  return tenths;
}

/**
 * Survey method: thirds that exceed *both* neighbours by at least the threshold of their own frequency. The first and last
 * band, and one beside a gap, have no pair of neighbours and are never tonal. Give unweighted levels, averaged over at
 * least 60 s, and say whether they are an interval's or a period's mean.
 */
export function surveyTones(spectrum: ThirdsTenths): TonalFinding[] {
  return testThirds('survey', spectrum, (level, below, above) => level - Math.max(below, above));
}

/**
 * The same thresholds against the *arithmetic mean* of both neighbours, as in ANSI S12.9 and RD 1367/2007 (from memory for
 * the former). Finds more than the survey method; name the method wherever this is shown.
 */
export function averagedNeighbourTones(spectrum: ThirdsTenths): TonalFinding[] {
  return testThirds('averaged-neighbours', spectrum, (level, below, above) => level - (below + above) / 2);
}

function testThirds(
  method: TonalMethod,
  spectrum: ThirdsTenths,
  excessOf: (level: number, below: number, above: number) => number,
): TonalFinding[] {
  const findings: TonalFinding[] = [];
  for (let slot = 1; slot < BAND_SLOTS - 1; slot += 1) {
    const thresholdTenths = THRESHOLD_OF_SLOT[slot] ?? null;
    const level = spectrum[slot] ?? null;
    const below = spectrum[slot - 1] ?? null;
    const above = spectrum[slot + 1] ?? null;
    if (thresholdTenths === null || level === null || below === null || above === null) continue;
    const excessTenths = excessOf(level, below, above);
    const index = slot + FIRST_BAND_INDEX;
    if (excessTenths >= thresholdTenths) {
      findings.push({ method, lowerIndex: index, upperIndex: index, excessTenths, thresholdTenths });
    }
  }
  return findings;
}

/**
 * Bittern's own addition: the energy sum of two adjacent thirds against both outer neighbours, with the lower third's
 * threshold, for a tone near a band edge, which splits over both and hides from the survey method. A pair that holds a third
 * which the survey method finds is left to that; of overlapping pairs the one that stands out most remains.
 */
export function adjacentPairTones(spectrum: ThirdsTenths): TonalFinding[] {
  const single = new Set(surveyTones(spectrum).map((finding) => finding.lowerIndex));
  const found: TonalFinding[] = [];
  for (let slot = 1; slot < BAND_SLOTS - 2; slot += 1) {
    const finding = testPair(spectrum, slot);
    if (finding && !single.has(finding.lowerIndex) && !single.has(finding.upperIndex)) found.push(finding);
  }
  const byExcess = [...found].sort((a, b) => b.excessTenths - a.excessTenths);
  const kept: TonalFinding[] = [];
  for (const finding of byExcess) {
    if (!kept.some((other) => Math.abs(other.lowerIndex - finding.lowerIndex) < 2)) kept.push(finding);
  }
  return kept.sort((a, b) => a.lowerIndex - b.lowerIndex);
}

function testPair(spectrum: ThirdsTenths, lowerSlot: number): TonalFinding | null {
  const thresholdTenths = THRESHOLD_OF_SLOT[lowerSlot] ?? null;
  const isUpperTested = (THRESHOLD_OF_SLOT[lowerSlot + 1] ?? null) !== null;
  const below = spectrum[lowerSlot - 1] ?? null;
  const lower = spectrum[lowerSlot] ?? null;
  const upper = spectrum[lowerSlot + 1] ?? null;
  const above = spectrum[lowerSlot + 2] ?? null;
  if (thresholdTenths === null || !isUpperTested) return null;
  if (below === null || lower === null || upper === null || above === null) return null;
  const sumTenths = toTenths(10 * Math.log10(10 ** (lower / 100) + 10 ** (upper / 100)));
  const excessTenths = sumTenths - Math.max(below, above);
  if (excessTenths < thresholdTenths) return null;
  const lowerIndex = lowerSlot + FIRST_BAND_INDEX;
  return { method: 'adjacent-pair', lowerIndex, upperIndex: lowerIndex + 1, excessTenths, thresholdTenths };
}

/** What can be said about tones in a spectrum. */
export type TonalAssessment =
  | { kind: 'not-assessable'; reason: 'octave-bands' | 'no-neighbours' | 'averaged-too-short' }
  | { kind: 'assessed'; findings: TonalFinding[] };

/** Seconds that a spectrum must be averaged over before it is tested. */
export const TONAL_AVERAGING_SEC = 60;

/**
 * Tones of one spectrum by the survey method and by adjacent pairs. An octave spectrum, one averaged for less than 60 s, and
 * one without any third that has both neighbours are "not assessable", which is not the same as "no tone".
 */
export function assessTonality(
  fraction: BandFraction,
  levelsDb: readonly (number | null)[],
  bands: readonly Pick<Band, 'index'>[],
  averagedSec: number,
): TonalAssessment {
  if (fraction === 1) return { kind: 'not-assessable', reason: 'octave-bands' };
  if (averagedSec < TONAL_AVERAGING_SEC) return { kind: 'not-assessable', reason: 'averaged-too-short' };
  const spectrum = thirdsTenthsOfDb(levelsDb, bands);
  if (!isTestable(spectrum)) return { kind: 'not-assessable', reason: 'no-neighbours' };
  const findings = [...surveyTones(spectrum), ...adjacentPairTones(spectrum)];
  return { kind: 'assessed', findings: findings.sort((a, b) => a.lowerIndex - b.lowerIndex) };
}

function isTestable(spectrum: ThirdsTenths): boolean {
  return spectrum.some(
    (level, slot) =>
      level !== null &&
      (THRESHOLD_OF_SLOT[slot] ?? null) !== null &&
      (spectrum[slot - 1] ?? null) !== null &&
      (spectrum[slot + 1] ?? null) !== null,
  );
}
