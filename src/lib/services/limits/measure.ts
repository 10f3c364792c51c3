import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { bandSlot } from '#lib/acoustics/bands';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { toTenths } from '#lib/acoustics/rounding';

/** What a limit's window came to. */
export interface Measured {
  levelDb: number | null;
  /** Seconds that the level stands on. */
  validSec: number;
}

/** The sums that some limit may be about. */
export type MeasurableSums = Pick<
  PeriodSums,
  | 'validSec'
  | 'aEnergySec'
  | 'lafmaxCentiDb'
  | 'bandFraction'
  | 'isBandFractionMixed'
  | 'bandEnergySec'
  | 'bandValidSec'
>;

type Metric = Pick<LimitVersion, 'metric' | 'bandFraction' | 'bandIndex'>;

/** The level that a limit is about, from a window's sums. An octave of a one-third-octave station is the sum of its thirds. */
export function measure(metric: Metric, sums: MeasurableSums): Measured {
  if (metric.metric === 'LAFmax') {
    const { lafmaxCentiDb, validSec } = sums;
    return { levelDb: lafmaxCentiDb === null ? null : lafmaxCentiDb / 100, validSec };
  }
  const parts = partsOf(metric, sums);
  const validSec = parts.length === 0 ? 0 : Math.min(...parts.map((part) => part.validSec));
  if (validSec === 0) return { levelDb: null, validSec };
  const meanEnergy = parts.reduce((sum, part) => sum + part.energySec / part.validSec, 0);
  return { levelDb: levelOfEnergyDb(meanEnergy), validSec };
}

interface Part {
  energySec: number;
  validSec: number;
}

/** What is summed to the mean level: one quantity, or the three thirds of an octave; nothing where the sums have none of it. */
function partsOf({ metric, bandFraction, bandIndex }: Metric, sums: MeasurableSums): Part[] {
  if (metric === 'LAeq') return [{ energySec: sums.aEnergySec, validSec: sums.validSec }];
  if (bandIndex === null) throw new RangeError('A band limit names no band.');
  if (bandFraction === 3 && sums.bandFraction !== 3) return [];
  const bands = bandFraction === sums.bandFraction ? [bandIndex] : thirdsOfOctave(bandIndex);
  return bands.map(bandSlot).map((slot) => ({
    energySec: sums.bandEnergySec[slot] ?? 0,
    validSec: sums.bandValidSec[slot] ?? 0,
  }));
}

/** A window as a version of a limit judges it. */
export interface Judged extends Measured {
  /** Valid seconds over those of the window, 0–1. */
  coverage: number;
  /** Whether it has the coverage that it takes to be compared. */
  isCovered: boolean;
  isExceeded: boolean;
}

/** Judges a closed window; `minimumCoverage` as `minimumFor` has it. The worker and trials judge by this alone. */
export function judgeWindow(
  version: Metric & Pick<LimitVersion, 'thresholdTenths'>,
  { lengthSec, minimumCoverage }: { lengthSec: number; minimumCoverage: number | null },
  sums: MeasurableSums,
): Judged {
  const { levelDb, validSec } = measure(version, sums);
  const coverage = validSec / lengthSec;
  const isCovered = coverage >= (minimumCoverage ?? 0) - 1e-9;
  const isExceeded = isCovered && isAbove(version, levelDb);
  return { levelDb, validSec, coverage, isCovered, isExceeded };
}

/**
 * Whether a level is above a limit: strictly greater, both in whole tenths of a dB, the level rounded half up once. No level is
 * above nothing.
 */
export function isAbove(
  { thresholdTenths }: Pick<LimitVersion, 'thresholdTenths'>,
  levelDb: number | null,
): boolean {
  return levelDb !== null && toTenths(levelDb) > thresholdTenths;
}

/**
 * Coverage that a window needs to be compared with a limit: the limit's own, else the network's. Null for a maximum: one that
 * was measured is one, however little else was.
 */
export function minimumFor(
  { metric, minimumCoverage }: Pick<LimitVersion, 'metric' | 'minimumCoverage'>,
  settings: Pick<NetworkSettings, 'minimumCoverage'>,
): number | null {
  return metric === 'LAFmax' ? null : (minimumCoverage ?? settings.minimumCoverage);
}
