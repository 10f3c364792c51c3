import { type DayPeriod } from '#db/queries/dayPeriods';
import { type MeasuredInterval } from '#db/queries/intervalRows';
import { type QuarterHour } from '#db/queries/quarterHours';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import {
  accumulate,
  countBandClasses,
  firstEndingAfter,
  type Judgement,
} from '#lib/services/levels/accumulate';
import { quarterOf } from '#lib/services/levels/quarterOf';
import { type PeriodInstance } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import { type Part } from './parts';

/** A part's rows from its intervals (ascending, disjoint). */
export class PartRows {
  readonly #known = new Map<number, QuarterHour | null>();

  constructor(
    private readonly part: Part,
    private readonly intervals: readonly MeasuredInterval[],
    private readonly judgement: Judgement,
  ) {}

  /** Marked quarter-hours that have intervals. */
  quarters(): QuarterHour[] {
    return this.part.quarterStartsSec
      .map((startSec) => this.#quarterAt(startSec))
      .filter((quarter) => quarter !== null);
  }

  /** A period of the part, if it has intervals. */
  period(period: PeriodInstance): DayPeriod | null {
    return isWholeQuarters(period)
      ? periodOfQuarters(period, this.#quartersOf(period), this.intervals, this.judgement)
      : periodOfIntervals(period, this.intervals, this.judgement);
  }

  #quartersOf({ fromSec, toSec }: PeriodInstance): QuarterHour[] {
    const quarters: QuarterHour[] = [];
    for (let startSec = fromSec; startSec < toSec; startSec += QUARTER_SEC) {
      const quarter = this.#quarterAt(startSec);
      if (quarter) quarters.push(quarter);
    }
    return quarters;
  }

  #quarterAt(startSec: number): QuarterHour | null {
    let quarter = this.#known.get(startSec);
    if (quarter === undefined) {
      quarter = quarterOf(this.intervals, startSec, this.judgement);
      this.#known.set(startSec, quarter);
    }
    return quarter;
  }
}

/** Whether a period begins and ends on quarter-hours of UTC, as in every zone since 1972. */
function isWholeQuarters({ fromSec, toSec }: PeriodInstance): boolean {
  return fromSec % QUARTER_SEC === 0 && toSec % QUARTER_SEC === 0;
}

/** Energies are those of its quarter-hours; only distributions per band, which these do not have, are counted from intervals. */
function periodOfQuarters(
  period: PeriodInstance,
  quarters: readonly QuarterHour[],
  intervals: readonly MeasuredInterval[],
  judgement: Judgement,
): DayPeriod | null {
  if (quarters.length === 0) return null;
  const levels = new PeriodAccumulator();
  let flagBits = 0;
  for (const quarter of quarters) {
    flagBits |= quarter.flagBits;
    levels.merge(quarter);
  }
  countBandClasses(levels, intervals, period, judgement);
  return { ...period, flagBits, sums: levels.sums };
}

function periodOfIntervals(
  period: PeriodInstance,
  intervals: readonly MeasuredInterval[],
  judgement: Judgement,
): DayPeriod | null {
  let flagBits = 0;
  const first = firstEndingAfter(intervals, period.fromSec);
  let end = first;
  for (; (intervals[end]?.startSec ?? Infinity) < period.toSec; end += 1)
    flagBits |= intervals[end]?.flags ?? 0;
  if (end === first) return null;
  return { ...period, flagBits, sums: accumulate(intervals, period, judgement, { bandClasses: true }).sums };
}
