import { addDays, localMinuteAt, startOfDaySec, type LocalDate } from './zone';

/** A window that a limit looks at: half-open, epoch seconds. */
export interface LimitWindow {
  startSec: number;
  endSec: number;
}

export interface ClockWindow extends LimitWindow {
  /** Local clock at its beginning, minutes after midnight. */
  clockMin: number;
}

/** A civil date on the clock on the wall. */
export interface DateClock {
  dayFromSec: number;
  dayToSec: number;
  /** What the clock shows, minutes after midnight, at an instant of the date. */
  clockAt: (sec: number) => number;
}

const DAY_SEC = 86_400;
const HOUR_MIN = 60;

/** Windows begin and end on these minutes of the clock. */
export const WINDOW_GRAIN_MIN = 5;

export function clockOf(date: LocalDate, zone: string): DateClock {
  const dayFromSec = startOfDaySec(date, zone);
  const dayToSec = startOfDaySec(addDays(date, 1), zone);
  // Without a clock change the clock is elapsed time; with one it is asked.
  const isPlain = dayToSec - dayFromSec === DAY_SEC;
  const clockAt = isPlain
    ? (sec: number) => (sec - dayFromSec) / 60
    : (sec: number) => localMinuteAt(sec, zone);
  return { dayFromSec, dayToSec, clockAt };
}

/**
 * Fixed windows by the clock of a civil date. They tile it: one that a clock change cuts off is a window of what elapsed of it.
 * Where an hour comes twice, windows of an hour or less come twice as well; a longer one has it all.
 */
export function clockWindows({ dayFromSec, dayToSec, clockAt }: DateClock, lengthMin: number): ClockWindow[] {
  const grainSec = grainMinOf(lengthMin) * 60;
  const windows: ClockWindow[] = [];
  let lastPlace = NaN;
  for (let startSec = dayFromSec; startSec < dayToSec; startSec += grainSec) {
    const clockMin = clockAt(startSec);
    const place =
      lengthMin <= HOUR_MIN ? startSec - (clockMin % lengthMin) * 60 : Math.floor(clockMin / lengthMin);
    const last = windows.at(-1);
    const isSame = lengthMin <= HOUR_MIN ? place === lastPlace : place <= lastPlace;
    if (last && isSame) {
      last.endSec += grainSec;
    } else {
      windows.push({ startSec, endSec: startSec + grainSec, clockMin });
      lastPlace = place;
    }
  }
  return windows;
}

/** Rolling windows that begin on a civil date, every so many minutes since its midnight; each has its whole length. */
export function rollingWindows(
  { dayFromSec, dayToSec, clockAt }: DateClock,
  lengthMin: number,
  stepMin: number,
): ClockWindow[] {
  const windows: ClockWindow[] = [];
  for (let startSec = dayFromSec; startSec < dayToSec; startSec += stepMin * 60) {
    windows.push({ startSec, endSec: startSec + lengthMin * 60, clockMin: clockAt(startSec) });
  }
  return windows;
}

/** What such windows are made of: whole quarter-hours where they can be, else fives of minutes. */
function grainMinOf(lengthMin: number): number {
  return lengthMin % 15 === 0 ? 15 : WINDOW_GRAIN_MIN;
}
