import { type Band } from './bands';

/**
 * NR curves by octave, L = a + b·NR (ISO/R 1996:1971; constants as in AS 1469-1983 and Bies & Hansen Table 4.7; one source
 * prints a = 35.4 at 63 Hz).
 */
const NR_CURVES: readonly { bandIndex: number; aDb: number; b: number }[] = [
  { bandIndex: -15, aDb: 55.4, b: 0.681 },
  { bandIndex: -12, aDb: 35.5, b: 0.79 },
  { bandIndex: -9, aDb: 22.0, b: 0.87 },
  { bandIndex: -6, aDb: 12.0, b: 0.93 },
  { bandIndex: -3, aDb: 4.8, b: 0.974 },
  { bandIndex: 0, aDb: 0.0, b: 1.0 },
  { bandIndex: 3, aDb: -3.5, b: 1.015 },
  { bandIndex: 6, aDb: -6.1, b: 1.025 },
  { bandIndex: 9, aDb: -8.0, b: 1.03 },
];

/** Slack so that a level exactly on a curve is not rounded up to the next. */
const ON_CURVE_SLACK = 1e-9;

/** Band indices of the octaves that NR looks at, 31.5 Hz–8 kHz. */
export const NR_BAND_INDICES = NR_CURVES.map(({ bandIndex }) => bandIndex);

/** The NR rating of an octave spectrum. */
export interface NoiseRating {
  /** Exact rating; quote `nr`. */
  exact: number;
  /** Whole number, rounded up. */
  nr: number;
  /** Band index of the octave that decides. */
  governingIndex: number;
  /** Some octave from 31.5 Hz to 8 kHz is missing: the rating is "at least" this. */
  isAtLeast: boolean;
  perBand: { bandIndex: number; nr: number }[];
}

/** Level in dB of an NR curve in an octave. @throws RangeError outside 31.5 Hz–8 kHz. */
export function nrCurveDb(nr: number, bandIndex: number): number {
  const curve = NR_CURVES.find((candidate) => candidate.bandIndex === bandIndex);
  if (!curve) throw new RangeError(`NR has no octave ${bandIndex}.`);
  return curve.aDb + curve.b * nr;
}

/**
 * NR rating of unweighted octave levels in dB: the highest over 31.5 Hz–8 kHz of (L − a)/b, with the octave that governs.
 * Null when none of them has a level. NR is meant for rooms: say so where it is shown for an outdoor station.
 */
export function noiseRating(
  levelsDb: readonly (number | null)[],
  octaves: readonly Pick<Band, 'index'>[],
): NoiseRating | null {
  const levelOf = new Map(octaves.map((band, i) => [band.index, levelsDb[i] ?? null]));
  const perBand = NR_CURVES.flatMap(({ bandIndex, aDb, b }) => {
    const levelDb = levelOf.get(bandIndex) ?? null;
    return levelDb === null ? [] : [{ bandIndex, nr: (levelDb - aDb) / b }];
  });
  const [first, ...rest] = perBand;
  if (!first) return null;
  const governing = rest.reduce((highest, band) => (band.nr > highest.nr ? band : highest), first);
  return {
    exact: governing.nr,
    nr: Math.ceil(governing.nr - ON_CURVE_SLACK) + 0, // + 0: never −0
    governingIndex: governing.bandIndex,
    isAtLeast: perBand.length < NR_CURVES.length,
    perBand,
  };
}
