import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import { bandSlot } from '#lib/acoustics/bands';
import type { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { toTenths } from '#lib/acoustics/rounding';

/** What a limit's window came to. */
export interface Measured {
  levelDb: number | null;
  /** Seconds that the level stands on. */
  validSec: number;
}

type Metric = Pick<LimitVersion, 'metric' | 'bandFraction' | 'bandIndex'>;

/** The level that a limit is about, from a window's sums. An octave of a one-third-octave station is the sum of its thirds. */
export function measure({ metric, bandFraction, bandIndex }: Metric, levels: PeriodAccumulator): Measured {
  const { sums } = levels;
  if (metric === 'LAeq') return { levelDb: levels.laeqDb(), validSec: sums.validSec };
  if (metric === 'LAFmax') {
    return {
      levelDb: sums.lafmaxCentiDb === null ? null : sums.lafmaxCentiDb / 100,
      validSec: sums.validSec,
    };
  }
  if (bandIndex === null) throw new RangeError('A band limit names no band.');
  const secondsOf = (index: number) => sums.bandValidSec[bandSlot(index)] ?? 0;
  if (bandFraction === sums.bandFraction)
    return { levelDb: levels.bandLeqDb(bandIndex), validSec: secondsOf(bandIndex) };
  if (bandFraction === 3) return { levelDb: null, validSec: 0 };
  return {
    levelDb: levels.octaveLeqDb(bandIndex),
    validSec: Math.min(...thirdsOfOctave(bandIndex).map(secondsOf)),
  };
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
