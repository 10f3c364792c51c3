import { QUARTER_SEC } from '#lib/time/quarters';
import { localDateAt, localMinuteAt, weekdayOf } from '#lib/time/zone';

/** Weekday (0 = Monday) and minute of the day by the clock on the wall. */
export interface CivilMinute {
  weekday: number;
  minuteOfDay: number;
}

/** Clocks of minutes that come in order: a quarter-hour is looked up once, no clock changes within it. */
export class CivilMinutes {
  #quarterSec = NaN;
  #quarter: CivilMinute = { weekday: 0, minuteOfDay: 0 };

  constructor(private readonly zone: string) {}

  at(sec: number): CivilMinute {
    const quarterSec = sec - (sec % QUARTER_SEC);
    if (quarterSec !== this.#quarterSec) {
      this.#quarterSec = quarterSec;
      const weekday = weekdayOf(localDateAt(quarterSec, this.zone));
      this.#quarter = { weekday, minuteOfDay: localMinuteAt(quarterSec, this.zone) };
    }
    const { weekday, minuteOfDay } = this.#quarter;
    return { weekday, minuteOfDay: (minuteOfDay + Math.floor((sec - quarterSec) / 60)) % 1440 };
  }
}
