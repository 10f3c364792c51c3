import { roundHalfUp } from './rounding';

/** Character of a sound that a person may adjust its level for. */
export type AdjustmentKind = 'tonal' | 'impulsive' | 'intermittent' | 'other';

/** Highest adjustment of each kind in dB (BS 4142:2014+A1:2019 clause 9: tonal 0–6, impulsive 0–9, others 3). */
export const MAXIMUM_ADJUSTMENT_DB: Readonly<Record<AdjustmentKind, number>> = {
  tonal: 6,
  impulsive: 9,
  intermittent: 3,
  other: 3,
};

/** An adjustment that a person entered, and why. Bittern never adds one by itself. */
export interface Adjustment {
  kind: AdjustmentKind;
  adjustmentDb: number;
  reason: string;
}

/** A rating level with what it is made of. */
export interface RatingLevel {
  specificDb: number;
  adjustments: readonly Adjustment[];
  /** Specific level plus all adjustments, dB, unrounded. */
  ratingDb: number;
}

/** How a rating level lies to the background, as a key for wording. Always "depending on the context". */
export type BackgroundVerdict = 'low-impact' | 'less-likely' | 'adverse' | 'significantly-adverse';

/** Rating level minus background level. */
export interface BackgroundComparison {
  /** dB, unrounded. */
  excessDb: number;
  /** Whole dB, rounded half up once; the verdict is made on it. */
  excessWholeDb: number;
  verdict: BackgroundVerdict;
}

/** What is wrong with an adjustment, in words for the person who entered it, or null. */
export function adjustmentProblem({ kind, adjustmentDb, reason }: Adjustment): string | null {
  const maximumDb = MAXIMUM_ADJUSTMENT_DB[kind];
  if (!(adjustmentDb >= 0 && adjustmentDb <= maximumDb)) {
    return `An adjustment of this kind is between 0 and ${maximumDb} dB.`;
  }
  return reason.trim() === '' ? 'Give the reason for the adjustment.' : null;
}

/**
 * Rating level: specific level plus a person's adjustments, linearly summed (BS 4142:2014+A1:2019 clause 9.2; that tonal and
 * impulsive ones add up is from memory).
 * @throws RangeError for an adjustment out of its range, without a reason, or twice of one kind.
 */
export function ratingLevel(specificDb: number, adjustments: readonly Adjustment[]): RatingLevel {
  const kinds = new Set<AdjustmentKind>();
  let ratingDb = specificDb;
  for (const adjustment of adjustments) {
    const problem = adjustmentProblem(adjustment);
    if (problem) throw new RangeError(problem);
    if (kinds.has(adjustment.kind)) throw new RangeError(`There are two ${adjustment.kind} adjustments.`);
    kinds.add(adjustment.kind);
    ratingDb += adjustment.adjustmentDb;
  }
  return { specificDb, adjustments, ratingDb };
}

/**
 * Level in dB over a reference time of a sound that is on for a part of it: Ls + 10 lg(t_on/Tr) (BS 4142 clause 7).
 * @throws RangeError unless 0 < on ≤ reference.
 */
export function onTimeCorrectedDb(levelDb: number, onSec: number, referenceSec: number): number {
  if (!(onSec > 0 && onSec <= referenceSec)) throw new RangeError(`On for ${onSec} s of ${referenceSec} s.`);
  return levelDb + 10 * Math.log10(onSec / referenceSec);
}

/**
 * Compares a rating level with the background LA90 (BS 4142 clause 11): about +5 dB adverse, about +10 dB or more significantly
 * adverse, at or below the background low impact, each depending on the context. "About": judged on the excess in whole dB.
 */
export function compareWithBackground(ratingDb: number, backgroundDb: number): BackgroundComparison {
  const excessDb = ratingDb - backgroundDb;
  const excessWholeDb = roundHalfUp(excessDb, 0);
  return { excessDb, excessWholeDb, verdict: verdictOf(excessWholeDb) };
}

function verdictOf(excessWholeDb: number): BackgroundVerdict {
  if (excessWholeDb >= 10) return 'significantly-adverse';
  if (excessWholeDb >= 5) return 'adverse';
  return excessWholeDb <= 0 ? 'low-impact' : 'less-likely';
}
