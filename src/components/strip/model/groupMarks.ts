import { type Run } from './runs';

/** Things whose marks would lie on one another, as one mark in their middle. */
export interface GroupedMark<T> {
  px: number;
  held: T[];
}

/** Marks in order of time, none closer to the next than `leastPx`; what is out of sight has none. */
export function groupMarks<T extends Run>(
  all: readonly T[],
  pxOfSec: (sec: number) => number,
  widthPx: number,
  leastPx: number,
): GroupedMark<T>[] {
  const placed = all
    .map((one) => ({ one, px: pxOfSec((one.fromSec + one.toSec) / 2) }))
    .filter(({ px }) => px >= 0 && px <= widthPx)
    .sort((a, b) => a.px - b.px);
  const marks: GroupedMark<T>[] = [];
  for (const { one, px } of placed) {
    const last = marks.at(-1);
    if (last && px - last.px < leastPx) last.held.push(one);
    else marks.push({ px, held: [one] });
  }
  return marks;
}
