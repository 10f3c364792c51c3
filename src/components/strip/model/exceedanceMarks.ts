import type { LimitUnit } from '#lib/format/limitMetric';

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

/** Exceedances whose marks would lie on one another, as one mark in their middle. */
export interface ExceedanceMark {
  px: number;
  exceedances: StripExceedance[];
}

/** Marks in order of time, none closer to the next than `leastPx`. Lifted exceedances and those out of sight have none. */
export function exceedanceMarks(
  exceedances: readonly StripExceedance[],
  pxOfSec: (sec: number) => number,
  widthPx: number,
  leastPx: number,
): ExceedanceMark[] {
  const placed = exceedances
    .filter((exceedance) => exceedance.isStanding)
    .map((exceedance) => ({ exceedance, px: pxOfSec((exceedance.fromSec + exceedance.toSec) / 2) }))
    .filter(({ px }) => px >= 0 && px <= widthPx)
    .sort((a, b) => a.px - b.px);
  const marks: (ExceedanceMark & { lastPx: number })[] = [];
  for (const { exceedance, px } of placed) {
    const last = marks.at(-1);
    if (last && px - last.px < leastPx) {
      last.exceedances.push(exceedance);
      last.lastPx = px;
    } else {
      marks.push({ px, lastPx: px, exceedances: [exceedance] });
    }
  }
  return marks.map(({ px, exceedances: held }) => ({ px, exceedances: held }));
}
