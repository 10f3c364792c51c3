import { wholeOf, type Span } from '#lib/services/levels/spans';
import { type PeriodInstance } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type Chunk } from './chunks';

/** What of a chunk is computed at once: the periods of a local date that have ended, and the marked quarter-hours within them. */
export interface Part {
  /** Marked, ascending. */
  quarterStartsSec: number[];
  /** Ended, ascending. */
  periods: PeriodInstance[];
  /** Everything that the part's rows are made of. */
  span: Span;
}

/** A chunk by local dates, in order of time. Periods that still run at `nowSec` are left out; their quarter-hours are not. */
export function partsOf({ periods, quarterStartsSec }: Chunk, nowSec: number): Part[] {
  const dates = [...new Set(periods.map(({ date }) => date))];
  let taken = 0;
  return dates.flatMap((date, at) => {
    const ofDate = periods.filter((period) => period.date === date);
    const endSec = at === dates.length - 1 ? Infinity : Math.max(...ofDate.map(({ toSec }) => toSec));
    const first = taken;
    while ((quarterStartsSec[taken] ?? Infinity) < endSec) taken += 1;
    const ofPart = quarterStartsSec.slice(first, taken);
    const ended = ofDate.filter(({ toSec }) => toSec <= nowSec);
    const spans = [...ended, ...ofPart.map((fromSec) => ({ fromSec, toSec: fromSec + QUARTER_SEC }))];
    return spans.length === 0 ? [] : [{ quarterStartsSec: ofPart, periods: ended, span: wholeOf(spans) }];
  });
}
