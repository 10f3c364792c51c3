import { emptySums, mergeSums } from '#lib/acoustics/periodSums';
import type { LimitWindow } from '#lib/services/limits/windows';
import type { MeasurableSums } from '#lib/services/limits/measure';
import { QUARTER_SEC } from '#lib/time/quarters';
import type { TrialQuarter } from './trialQuarters';

const NOTHING: MeasurableSums = emptySums({ bandClasses: false });

/** Sums of windows from quarter-hours, both ascending; asked for in order of time. */
export class WindowSums {
  #next = 0;

  constructor(private readonly quarters: readonly TrialQuarter[]) {}

  /** Sums of one window, that begins no earlier than the one before. */
  of({ startSec, endSec }: LimitWindow): MeasurableSums {
    while ((this.quarters[this.#next]?.startSec ?? Infinity) < startSec) this.#next += 1;
    let end = this.#next;
    while ((this.quarters[end]?.startSec ?? Infinity) + QUARTER_SEC <= endSec) end += 1;
    // Most windows of a year are single quarter-hours: these are taken as they are.
    if (end - this.#next > 1) return sumOf(this.quarters.slice(this.#next, end));
    return (end > this.#next && this.quarters[this.#next]?.sums) || NOTHING;
  }
}

/** As `mergeSums` has it, without what limits do not look at. */
function sumOf(quarters: readonly TrialQuarter[]): MeasurableSums {
  const whole = emptySums({ bandClasses: false });
  for (const { sums } of quarters) mergeSums(whole, { ...REST, ...sums });
  return whole;
}

/** Distributions and C-weighted sums of nothing: merging them changes nothing. */
const REST = emptySums({ bandClasses: false });
