import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type Seconds } from '#lib/contracts/levels';
import { type PeriodLevel } from './days';
import { levelOrNull } from './statistics';

/** Many days, evenings or nights as one: energies and distributions are pooled, never their levels averaged. */
export interface PooledPeriods {
  seconds: Seconds;
  coverage: number;
  meetsMinimum: boolean;
  /** dB over all valid seconds; null when there are none. */
  laeqDb: number | null;
  la10Db: number | null;
  la50Db: number | null;
  la90Db: number | null;
  lafmaxDb: number | null;
}

/** Pools periods; coverage is all their valid seconds against all that have elapsed. */
export function poolPeriods(periods: readonly PeriodLevel[], minimumCoverage: number): PooledPeriods {
  const levels = new PeriodAccumulator();
  for (const period of periods) levels.merge(period.levels);
  const expected = periods.reduce((sum, period) => sum + period.seconds.expected, 0);
  const { validSec, excludedSec, lafmaxCentiDb } = levels.sums;
  const coverage = expected === 0 ? 0 : Math.min(1, validSec / expected);
  return {
    seconds: { expected, valid: validSec, excluded: excludedSec },
    coverage,
    meetsMinimum: expected > 0 && coverage >= minimumCoverage,
    laeqDb: levels.laeqDb(),
    la10Db: levels.exceedanceLevelDb(10),
    la50Db: levels.exceedanceLevelDb(50),
    la90Db: levels.exceedanceLevelDb(90),
    lafmaxDb: levelOrNull(lafmaxCentiDb),
  };
}
