import type { WindowStrip } from '#lib/contracts/windowStrip';
import { formatClock } from '#lib/format/times';

const STEPS_SEC = [300, 600, 900, 1800, 3600, 7200, 10_800, 21_600, 43_200, 86_400];
const MOST_MARKS = 9;

/** Times to write under a strip: the finest round step that leaves room, by the UTC clock, which quarter-hours share. */
export function hourMarks(strip: WindowStrip, zone: string): { sec: number; label: string }[] {
  const lengthSec = strip.stepSec * strip.laeqDb.length;
  const stepSec = STEPS_SEC.find((step) => lengthSec / step <= MOST_MARKS) ?? 86_400;
  const marks = [];
  for (
    let sec = Math.ceil(strip.fromSec / stepSec) * stepSec;
    sec < strip.fromSec + lengthSec;
    sec += stepSec
  ) {
    marks.push({ sec, label: formatClock(sec, zone) });
  }
  return marks;
}
