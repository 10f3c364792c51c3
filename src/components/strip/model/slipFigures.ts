import { bandByNominalHz, type Band, type BandFraction } from '#lib/acoustics/bands';
import { levelFromBandsDb, type Weighting } from '#lib/acoustics/weighting';
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

/** What a selection's bands amount to. Null where one of the bands concerned has no level. */
export interface MarkedBands {
  /** Leq over the bands, unweighted: the energy sum of theirs. */
  leqDb: number | null;
  /** Their part of the energy of all bands, 0–1, unweighted and A-weighted. */
  shareZ: number | null;
  shareA: number | null;
}

/** Leq and share of energy of the bands that a selection marks. */
export function markedBands({ bands }: SlipFigures, selection: Selection): MarkedBands {
  const all = bands.map(({ band }) => band);
  const marked = new Set(selectedBands(selection, all).map(({ index }) => index));
  const within = bands.filter(({ band }) => marked.has(band.index));
  const leqDb = levelOf(within, 'Z');
  return { leqDb, shareZ: shareOf(within, bands, 'Z'), shareA: shareOf(within, bands, 'A') };
}

function shareOf(
  within: readonly BandFigure[],
  all: readonly BandFigure[],
  weighting: Weighting,
): number | null {
  // A band of the whole that has no level is left out of it, as the monitor gave none; one of the part's own is not.
  const part = levelOf(within, weighting);
  const whole = levelOf(
    all.filter(({ leqDb }) => leqDb !== null),
    weighting,
  );
  return part === null || whole === null ? null : 10 ** ((part - whole) / 10);
}

function levelOf(figures: readonly BandFigure[], weighting: Weighting): number | null {
  if (figures.some(({ leqDb }) => leqDb === null)) return null;
  return levelFromBandsDb(
    figures.map(({ leqDb }) => leqDb),
    figures.map(({ band }) => band),
    weighting,
  );
}
