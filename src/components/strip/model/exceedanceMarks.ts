import type { LimitUnit } from '#lib/format/limitMetric';
import { groupMarks, type GroupedMark } from './groupMarks';

/** An exceedance as the strip marks it. */
export interface StripExceedance {
  id: number;
  fromSec: number;
  toSec: number;
  limitName: string;
  levelDb: number;
  thresholdDb: number;
  /** Of its level and limit. */
  unit: LimitUnit;
  isStanding: boolean;
}

/** Marks in order of time, none closer to the next than `leastPx`. Lifted exceedances and those out of sight have none. */
export function exceedanceMarks(
  exceedances: readonly StripExceedance[],
  pxOfSec: (sec: number) => number,
  widthPx: number,
  leastPx: number,
): GroupedMark<StripExceedance>[] {
  const standing = exceedances.filter((exceedance) => exceedance.isStanding);
  return groupMarks(standing, pxOfSec, widthPx, leastPx);
}
