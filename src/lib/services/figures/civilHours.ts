import { addDays, instantAtSec, localDateAt, localMinuteAt, startOfDaySec } from '#lib/time/zone';
import { type Span } from '../levels/spans';

const HOUR_SEC = 3600;

/** An hour of the clock on the wall, clipped to the period it was asked for. */
export interface CivilHour extends Span {
  date: string;
  hour: number;
  /** 1 for the second of two hours of that name on a date; else 0. */
  turn: 0 | 1;
}

/** The hours of the clock on the wall in `fromSec <= t < toSec`, in order of time; a clock change repeats or skips some. */
export function civilHours({ fromSec, toSec }: Span, timeZone: string): CivilHour[] {
  const hours: CivilHour[] = [];
  for (let startSec = fromSec; startSec < toSec;) {
    const endSec = Math.min(nextHourSec(startSec, timeZone), toSec);
    const date = localDateAt(startSec, timeZone);
    const hour = Math.floor(localMinuteAt(startSec, timeZone) / 60);
    const last = hours.at(-1);
    const isAgain = last?.date === date && last.hour === hour;
    hours.push({ date, hour, turn: isAgain ? 1 : 0, fromSec: startSec, toSec: endSec });
    startSec = endSec;
  }
  return hours;
}

/** Hours of a date that its clock never shows, because the spring change leaves them out. */
export function skippedHours(date: string, timeZone: string): number[] {
  const lengthSec = startOfDaySec(addDays(date, 1), timeZone) - startOfDaySec(date, timeZone);
  if (lengthSec >= 24 * HOUR_SEC) return [];
  return Array.from({ length: 24 }, (_, hour) => hour).filter((hour) => {
    // The last minute of the hour: a half-hour change leaves the half of an hour.
    const sec = instantAtSec(date, hour * 60 + 59, timeZone);
    return Math.floor(localMinuteAt(sec, timeZone) / 60) !== hour;
  });
}

function nextHourSec(sec: number, timeZone: string): number {
  const wholeMinuteSec = Math.floor(sec / 60) * 60;
  return wholeMinuteSec + HOUR_SEC - (localMinuteAt(sec, timeZone) % 60) * 60;
}
