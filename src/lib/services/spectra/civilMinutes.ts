import { QUARTER_SEC } from '#lib/time/quarters';
import { localDateAt, localMinuteAt, weekdayOf } from '#lib/time/zone';

/** Weekday (0 = Monday) and minute of the day by the clock on the wall. */
export interface CivilMinute {
  weekday: number;
  minuteOfDay: number;
}

const DAY_SEC = 86_400;
const DAY_MINUTES = 1440;

/** Clocks of minutes that come in order: only a day in which clocks change is looked up by quarter-hours, others once. */
export class CivilMinutes {
  #fromSec = NaN;
  #lastsSec = 0;
  #from: CivilMinute = { weekday: 0, minuteOfDay: 0 };

  constructor(private readonly zone: string) {}

  at(sec: number): CivilMinute {
    if (!(sec >= this.#fromSec && sec < this.#fromSec + this.#lastsSec)) this.#lookUp(sec);
    const minutes = this.#from.minuteOfDay + Math.floor((sec - this.#fromSec) / 60);
    const isNextDay = minutes >= DAY_MINUTES;
    return {
      weekday: (this.#from.weekday + Number(isNextDay)) % 7,
      minuteOfDay: isNextDay ? minutes - DAY_MINUTES : minutes,
    };
  }

  /** The longest stretch around an instant without a change: its day of UTC, or its quarter-hour. */
  #lookUp(sec: number): void {
    const daySec = sec - (sec % DAY_SEC);
    const isEven = localMinuteAt(daySec, this.zone) === localMinuteAt(daySec + DAY_SEC, this.zone);
    this.#fromSec = isEven ? daySec : sec - (sec % QUARTER_SEC);
    this.#lastsSec = isEven ? DAY_SEC : QUARTER_SEC;
    this.#from = {
      weekday: weekdayOf(localDateAt(this.#fromSec, this.zone)),
      minuteOfDay: localMinuteAt(this.#fromSec, this.zone),
    };
  }
}
