import { bandAt, bandByNominalHz } from '#lib/acoustics/bands';
import { noiseRating, NR_BAND_INDICES, nrCurveDb, type NoiseRating } from '#lib/acoustics/noiseRating';
import type { BandRow } from '#lib/contracts/figureSheet';

/** Octaves beside an NR curve. */
export interface NrComparison {
  /** The curve's level in each octave, dB; null outside 31.5 Hz–8 kHz. */
  curveDb: (number | null)[];
  /** Null where no octave of the curve has a level. */
  rating: NoiseRating | null;
  governingHz: number;
  /** How far the governing octave lies above the curve, dB. */
  governingDifferenceDb: number;
}

/** Compares unweighted octave levels with the curve of an NR number. */
export function nrComparison(
  octaves: readonly Pick<BandRow, 'nominalHz' | 'Leq'>[],
  nr: number,
): NrComparison {
  const indices = octaves.map(({ nominalHz }) => bandByNominalHz(1, nominalHz)?.index ?? NaN);
  const levelsDb = octaves.map(({ Leq }) => Leq);
  const rating = noiseRating(
    levelsDb,
    indices.map((index) => ({ index })),
  );
  const curveDb = indices.map((index) => (NR_BAND_INDICES.includes(index) ? nrCurveDb(nr, index) : null));
  const governing = rating === null ? -1 : indices.indexOf(rating.governingIndex);
  return {
    curveDb,
    rating,
    governingHz: rating === null ? NaN : bandAt(1, rating.governingIndex).nominalHz,
    governingDifferenceDb: (levelsDb[governing] ?? NaN) - (curveDb[governing] ?? NaN),
  };
}
