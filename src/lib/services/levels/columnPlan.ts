import { QUARTER_SEC } from '#lib/time/quarters';
import { type Span } from './spans';

/** Columns of one answer unless more are asked for by number. */
export const USUAL_MOST_COLUMNS = 4000;
/** A month at one minute. */
export const MOST_COLUMNS = 44_640;
/** Longer periods are drawn from quarter-hours. */
export const LONG_PERIOD_SEC = 14 * 86_400;

/** Equal steps that cover a period. */
export interface ColumnPlan {
  /** Start of the first column: the period's, or up to one `unit` before it. */
  fromSec: number;
  stepSec: number;
  count: number;
  source: 'intervals' | 'quarter-hours';
}

/**
 * The finest steps that cover a period with at most `mostColumns` columns: whole multiples of the interval length, or, for a
 * period of more than 14 days, of the quarter-hour, unless more columns than usual are asked for and give steps finer than
 * that, or where intervals are no longer kept (before `keptFromSec`). Columns begin on whole multiples of that unit.
 */
export function planColumns(
  period: Span,
  intervalSec: number,
  mostColumns: number,
  keptFromSec = 0,
): ColumnPlan {
  const native = stepsOf(period, intervalSec, mostColumns);
  const isLong = period.toSec - period.fromSec > LONG_PERIOD_SEC;
  const isKept = period.fromSec >= keptFromSec;
  if (!isKept || (isLong && (mostColumns <= USUAL_MOST_COLUMNS || native.stepSec >= QUARTER_SEC))) {
    return {
      ...stepsOf(period, leastCommonMultiple(QUARTER_SEC, intervalSec), mostColumns),
      source: 'quarter-hours',
    };
  }
  return { ...native, source: 'intervals' };
}

function stepsOf(
  { fromSec: wantedSec, toSec }: Span,
  unitSec: number,
  mostColumns: number,
): Omit<ColumnPlan, 'source'> {
  const fromSec = Math.floor(wantedSec / unitSec) * unitSec;
  const stepSec = Math.ceil((toSec - fromSec) / (unitSec * mostColumns)) * unitSec;
  return { fromSec, stepSec, count: Math.ceil((toSec - fromSec) / stepSec) };
}

function leastCommonMultiple(a: number, b: number): number {
  let [larger, smaller] = [a, b];
  while (smaller !== 0) [larger, smaller] = [smaller, larger % smaller];
  return (a / larger) * b;
}
