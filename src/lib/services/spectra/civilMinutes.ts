import { QUARTER_SEC } from '#lib/time/quarters';
import { localDateAt, localMinuteAt, weekdayOf } from '#lib/time/zone';

const DAY_SEC = 86_400;
const DAY_MINUTES = 1440;
const WEEK_MINUTES = 7 * DAY_MINUTES;

/** Clocks of minutes that come in order: only a day in which clocks change is looked up by quarter-hours, others once. */
export class CivilMinutes {
  #fromSec = NaN;
  #lastsSec = 0;
  #fromMinute = 0;

  constructor(private readonly zone: string) {}

  /** Minute of the week (0: Monday, 00:00) by the clock on the wall. */
  at(sec: number): number {
    if (!(sec >= this.#fromSec && sec < this.#fromSec + this.#lastsSec)) this.#lookUp(sec);
    return (this.#fromMinute + Math.floor((sec - this.#fromSec) / 60)) % WEEK_MINUTES;
  }

  /** The longest stretch around an instant without a change: its day of UTC, or its quarter-hour. */
  #lookUp(sec: number): void {
    const daySec = sec - (sec % DAY_SEC);
    const isEven = localMinuteAt(daySec, this.zone) === localMinuteAt(daySec + DAY_SEC, this.zone);
    this.#fromSec = isEven ? daySec : sec - (sec % QUARTER_SEC);
    this.#lastsSec = isEven ? DAY_SEC : QUARTER_SEC;
    const weekday = weekdayOf(localDateAt(this.#fromSec, this.zone));
    this.#fromMinute = weekday * DAY_MINUTES + localMinuteAt(this.#fromSec, this.zone);
  }
}
