import { type MeasuredInterval } from '#db/queries/intervalRows';
import { type QuarterHour } from '#db/queries/quarterHours';
import { QUARTER_SEC } from '#lib/time/quarters';
import { accumulate, counts, firstEndingAfter, rulesSpans, type Judgement } from './accumulate';
import { isLate, reasonBitsOf } from './seen';

/** A quarter-hour wholly from intervals (ascending, disjoint; more than its own may be given); null when it has none. */
export function quarterOf(
  intervals: readonly MeasuredInterval[],
  startSec: number,
  judgement: Judgement,
): QuarterHour | null {
  const span = { fromSec: startSec, toSec: startSec + QUARTER_SEC };
  const [rulesSpan] = rulesSpans(span.fromSec, span.toSec, judgement.timeline);
  const quarter = { startSec, flagBits: 0, reasonBits: 0, lateSec: 0 };
  let hasIntervals = false;
  for (let at = firstEndingAfter(intervals, span.fromSec); at < intervals.length; at += 1) {
    const interval = intervals[at];
    if (!interval || !rulesSpan || interval.startSec >= span.toSec) break;
    hasIntervals = true;
    quarter.flagBits |= interval.flags;
    if (!counts(interval, rulesSpan.rules, judgement)) {
      quarter.reasonBits |= reasonBitsOf(interval, rulesSpan.rules, judgement);
    }
    if (isLate(interval)) quarter.lateSec += overlapSec(interval, span.fromSec, span.toSec);
  }
  if (!hasIntervals) return null;
  return { ...quarter, sums: accumulate(intervals, span, judgement, { bandClasses: false }).sums };
}

/** Seconds of an interval within `fromSec <= t < toSec`. */
export function overlapSec(
  { startSec, durationSec }: Pick<MeasuredInterval, 'startSec' | 'durationSec'>,
  fromSec: number,
  toSec: number,
): number {
  return Math.min(startSec + durationSec, toSec) - Math.max(startSec, fromSec);
}
