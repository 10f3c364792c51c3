import { type CalibrationRow } from '#db/queries/calibrations';
import { type DeploymentRow } from '#db/queries/deployments';

interface Period {
  fromSec: number;
  toSec: number;
}

type Check = Pick<
  CalibrationRow,
  'instrumentId' | 'checkedAtSec' | 'calibratorCentiDb' | 'beforeCentiDb' | 'afterCentiDb'
>;
type Stay = Pick<DeploymentRow, 'instrumentId' | 'startSec' | 'endSec'>;

/** What calibration checks tell of how far the levels of a period may be off. */
export interface PeriodDrift {
  /** The furthest that any of these checks found or left an instrument off, dB; 0 where there is none. */
  driftDb: number;
  /** `before`, `after`: each instrument of the period was checked before it, and after it (or within). */
  known: 'both' | 'before' | 'after' | 'none';
}

/**
 * How far the instruments of a period were off by the checks that enclose it: what the last check before (or at) its beginning left,
 * what those within it found and left, and what the first after it found. Between two checks nothing else is known, so the
 * largest counts for the whole period, which is on the safe side. Checks in any order; withdrawn ones left out.
 */
export function periodDrift(period: Period, stays: readonly Stay[], checks: readonly Check[]): PeriodDrift {
  const offsCentiDb: number[] = [];
  const sides = { isBefore: stays.length > 0, isAfter: stays.length > 0 };
  for (const { instrumentId, startSec, endSec } of stays) {
    const fromSec = Math.max(period.fromSec, startSec);
    const toSec = Math.min(period.toSec, endSec ?? Infinity);
    const own = checks
      .filter((check) => check.instrumentId === instrumentId)
      .toSorted((a, b) => a.checkedAtSec - b.checkedAtSec);
    const before = own.findLast(({ checkedAtSec }) => checkedAtSec <= fromSec);
    const within = own.filter(({ checkedAtSec }) => checkedAtSec > fromSec && checkedAtSec < toSec);
    const after = own.find(({ checkedAtSec }) => checkedAtSec >= toSec);
    if (before) offsCentiDb.push(leftCentiDb(before));
    for (const check of within) offsCentiDb.push(foundCentiDb(check), leftCentiDb(check));
    if (after) offsCentiDb.push(foundCentiDb(after));
    sides.isBefore &&= before !== undefined;
    sides.isAfter &&= after !== undefined || within.length > 0;
  }
  const driftDb = Math.max(0, ...offsCentiDb.map(Math.abs)) / 100;
  return { driftDb, known: knownOf(sides) };
}

function foundCentiDb({ beforeCentiDb, calibratorCentiDb }: Check): number {
  return beforeCentiDb - calibratorCentiDb;
}

function leftCentiDb({ afterCentiDb, beforeCentiDb, calibratorCentiDb }: Check): number {
  return (afterCentiDb ?? beforeCentiDb) - calibratorCentiDb;
}

function knownOf({ isBefore, isAfter }: { isBefore: boolean; isAfter: boolean }): PeriodDrift['known'] {
  if (isBefore) return isAfter ? 'both' : 'before';
  return isAfter ? 'after' : 'none';
}
