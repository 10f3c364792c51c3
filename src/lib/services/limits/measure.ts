import type { LimitVersion, NewLimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { bandsOf, bandSlot } from '#lib/acoustics/bands';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { needsNoCoverage } from '#lib/acoustics/limitQuantities';
import { laeDb } from '#lib/acoustics/exposure';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { toTenths } from '#lib/acoustics/rounding';

/** What a limit's window came to. */
export interface Measured {
  /** In dB; of a share of time in per cent, of events their number. */
  levelDb: number | null;
  /** Seconds that the level stands on. */
  validSec: number;
  /** The wind dismisses the window: whatever the level, it is not compared. */
  isDismissed?: boolean;
}

/** The sums that some limit may be about. */
export type MeasurableSums = Pick<
  PeriodSums,
  | 'validSec'
  | 'aEnergySec'
  | 'cEnergySec'
  | 'cValidSec'
  | 'lafmaxCentiDb'
  | 'sampleSec'
  | 'aClasses'
  | 'bandFraction'
  | 'isBandFractionMixed'
  | 'bandEnergySec'
  | 'bandValidSec'
>;

export type MetricRule = Pick<
  NewLimitVersion,
  | 'metric'
  | 'bandFraction'
  | 'bandIndex'
  | 'percent'
  | 'bandToIndex'
  | 'eventTenths'
  | 'eventMinimumSec'
  | 'eventGapSec'
  | 'backgroundFromMin'
  | 'backgroundToMin'
  | 'windRule'
>;

/**
 * The level that a limit is about, from a window's sums. An octave of a one-third-octave station is the sum of its thirds.
 * @throws RangeError for quantities that a window's own sums do not tell: see `WindowEvidence`.
 */
export function measure(rule: MetricRule, sums: MeasurableSums): Measured {
  const { validSec } = sums;
  switch (rule.metric) {
    case 'LAFmax':
      return { levelDb: sums.lafmaxCentiDb === null ? null : sums.lafmaxCentiDb / 100, validSec };
    case 'LAeq':
      return meanOf([{ energySec: sums.aEnergySec, validSec }]);
    case 'LAE':
      return { levelDb: laeDb(laeqDb(sums), validSec), validSec };
    case 'LAN':
      return { levelDb: sums.aClasses.exceedanceLevelDb(rule.percent ?? NaN, sums.sampleSec), validSec };
    case 'LAeqLessLA90':
      return {
        levelDb: difference(laeqDb(sums), backgroundDb(rule, sums)),
        validSec,
      };
    case 'LCeqLessLAeq': {
      const lceq = meanOf([{ energySec: sums.cEnergySec, validSec: sums.cValidSec }]);
      return { levelDb: difference(lceq.levelDb, laeqDb(sums)), validSec: sums.cValidSec };
    }
    case 'bandLeq':
    case 'bandGroupLeq':
      return meanOf(bandParts(rule, sums));
    default:
      throw new RangeError(`${rule.metric} is not told by a window’s sums alone.`);
  }
}

/** How much one level is above another, dB; null where one is missing. */
export function difference(levelDb: number | null, fromDb: number | null): number | null {
  return levelDb === null || fromDb === null ? null : levelDb - fromDb;
}

/** The level that the background of a limit is: LA90, or LA95. */
export function backgroundDb({ percent }: MetricRule, sums: MeasurableSums): number | null {
  return sums.aClasses.exceedanceLevelDb(percent ?? 90, sums.sampleSec);
}

function laeqDb({ aEnergySec, validSec }: MeasurableSums): number | null {
  return meanOf([{ energySec: aEnergySec, validSec }]).levelDb;
}

interface Part {
  energySec: number;
  validSec: number;
}

/** The level of quantities together, each over its own valid seconds. */
function meanOf(parts: readonly Part[]): Measured {
  const validSec = parts.length === 0 ? 0 : Math.min(...parts.map((part) => part.validSec));
  if (validSec === 0) return { levelDb: null, validSec };
  const meanEnergy = parts.reduce((sum, part) => sum + part.energySec / part.validSec, 0);
  return { levelDb: levelOfEnergyDb(meanEnergy), validSec };
}

/** The bands that are summed: one, a group, or the three thirds of each octave; nothing where the sums have none of them. */
function bandParts(
  { metric, bandFraction, bandIndex, bandToIndex }: MetricRule,
  sums: MeasurableSums,
): Part[] {
  if (bandIndex === null || bandFraction === null) throw new RangeError('A band limit names no band.');
  if (bandFraction === 3 && sums.bandFraction !== 3) return [];
  const last = metric === 'bandGroupLeq' ? (bandToIndex ?? bandIndex) : bandIndex;
  return bandsOf(bandFraction)
    .filter(({ index }) => bandIndex <= index && index <= last)
    .flatMap(({ index }) => (bandFraction === sums.bandFraction ? [index] : thirdsOfOctave(index)))
    .map(bandSlot)
    .map((slot) => ({
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
  isDismissed: boolean;
  isExceeded: boolean;
}

interface JudgedLength {
  lengthSec: number;
  /** As `minimumFor` has it. */
  minimumCoverage: number | null;
}

/** Judges a closed window by what was measured of it. The worker and trials judge by this alone. */
export function judgeMeasured(
  version: Pick<LimitVersion, 'thresholdTenths'>,
  { lengthSec, minimumCoverage }: JudgedLength,
  { levelDb, validSec, isDismissed = false }: Measured,
): Judged {
  const coverage = validSec / lengthSec;
  const isCovered = coverage >= (minimumCoverage ?? 0) - 1e-9;
  const isExceeded = isCovered && !isDismissed && isAbove(version, levelDb);
  return { levelDb, validSec, coverage, isCovered, isDismissed, isExceeded };
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
 * Coverage that a window needs to be compared with a limit: the limit's own, else the network's. Null for a maximum and for events:
 * what was measured of these did occur, however little else was.
 */
export function minimumFor(
  { metric, minimumCoverage }: Pick<LimitVersion, 'metric' | 'minimumCoverage'>,
  settings: Pick<NetworkSettings, 'minimumCoverage'>,
): number | null {
  return needsNoCoverage(metric) ? null : (minimumCoverage ?? settings.minimumCoverage);
}
