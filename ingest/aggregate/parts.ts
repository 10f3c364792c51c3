import { wholeOf, type Span } from '#lib/services/levels/spans';
import { type PeriodInstance } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type Chunk } from './chunks';

/** What of a chunk is computed at once: the periods of some local dates that have ended, and the marked quarter-hours within them. */
export interface Part {
  /** Marked, ascending. */
  quarterStartsSec: number[];
  /** Ended, ascending. */
  periods: PeriodInstance[];
  /** Everything that the part's rows are made of. */
  span: Span;
}

/** Intervals that are held in memory at once, where a date has fewer: three dates of minutes. */
const INTERVALS_A_PART = 3 * 1440;
const DAY_SEC = 86_400;

/** A chunk by local dates, some at once, in order of time. Periods that still run at `nowSec` are left out; their quarter-hours are not. */
export function partsOf({ periods, quarterStartsSec }: Chunk, intervalSec: number, nowSec: number): Part[] {
  const dates = [...new Set(periods.map(({ date }) => date))];
  const datesAtOnce = Math.max(1, Math.floor((INTERVALS_A_PART * intervalSec) / DAY_SEC));
  const groups = Math.ceil(dates.length / datesAtOnce);
  let taken = 0;
  return Array.from({ length: groups }, (_, at) => at).flatMap((at) => {
    const group = new Set(dates.slice(at * datesAtOnce, (at + 1) * datesAtOnce));
    const ofGroup = periods.filter(({ date }) => group.has(date));
    const endSec = at === groups - 1 ? Infinity : Math.max(...ofGroup.map(({ toSec }) => toSec));
    const first = taken;
    while ((quarterStartsSec[taken] ?? Infinity) < endSec) taken += 1;
    const ofPart = quarterStartsSec.slice(first, taken);
    const ended = ofGroup.filter(({ toSec }) => toSec <= nowSec);
    const spans = [...ended, ...ofPart.map((fromSec) => ({ fromSec, toSec: fromSec + QUARTER_SEC }))];
    return spans.length === 0 ? [] : [{ quarterStartsSec: ofPart, periods: ended, span: wholeOf(spans) }];
  });
}
