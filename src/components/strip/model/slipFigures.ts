import { bandByNominalHz, type Band, type BandFraction } from '#lib/acoustics/bands';
import { energySumDb } from '#lib/acoustics/energy';
import type { Statistics } from '#lib/contracts/levels';
import { type SelectionFigures } from './estimate';
import { selectedBands, type Selection } from './selection';

/** A band with its figures, dB unweighted. */
export interface BandFigure {
  band: Band;
  leqDb: number | null;
  l10Db: number | null;
  l90Db: number | null;
}

/** What the reading slip shows: the estimate from the screen, then the server's answer in the same places. */
export interface SlipFigures {
  isEstimate: boolean;
  expectedSec: number;
  validSec: number;
  /** Null while the network's minimum has not been asked (an estimate). */
  meetsMinimum: boolean | null;
  laeqDb: number | null;
  lafmaxDb: number | null;
  la10Db: number | null;
  la90Db: number | null;
  /** Length of the base samples of the exceedance levels; null when mixed or unknown. */
  sampleSec: number | null;
  bands: BandFigure[];
}

/** The estimate as the slip shows it. */
export function figuresOfEstimate(estimate: SelectionFigures): SlipFigures {
  const { bands, bandLeqDb, ...figures } = estimate;
  return {
    ...figures,
    isEstimate: true,
    meetsMinimum: null,
    sampleSec: null,
    bands: bands.map((band, at) => ({ band, leqDb: bandLeqDb[at] ?? null, l10Db: null, l90Db: null })),
  };
}

/** The server's statistics as the slip shows them, in the bands of the view. */
export function figuresOfStatistics(statistics: Statistics, fraction: BandFraction): SlipFigures {
  const held = fraction === 1 ? statistics.octaves : statistics.bands;
  return {
    isEstimate: false,
    expectedSec: statistics.seconds.expected,
    validSec: statistics.seconds.valid,
    meetsMinimum: statistics.meetsMinimum,
    laeqDb: statistics.LAeq,
    lafmaxDb: statistics.LAFmax,
    la10Db: statistics.LAN['10'] ?? null,
    la90Db: statistics.LAN['90'] ?? null,
    sampleSec: statistics.sampleSeconds,
    bands: held.flatMap(({ nominalHz, Leq, L10, L90 }) => {
      const band = bandByNominalHz(fraction, nominalHz);
      return band ? [{ band, leqDb: Leq, l10Db: L10, l90Db: L90 }] : [];
    }),
  };
}

/** Leq over the bands that a selection marks: the energy sum of theirs; null when one of them has none. */
export function markedBandsLeqDb(figures: SlipFigures, selection: Selection): number | null {
  const marked = new Set(
    selectedBands(
      selection,
      figures.bands.map(({ band }) => band),
    ).map((band) => band.index),
  );
  const levels = figures.bands.filter(({ band }) => marked.has(band.index)).map(({ leqDb }) => leqDb);
  return levels.length > 0 && levels.every((level) => level !== null) ? energySumDb(levels) : null;
}
