import { offsetSec } from './offset';

/** A civil date as `YYYY-MM-DD`. */
export type LocalDate = string;

const DAY_SEC = 86_400;
const LOCAL_DATE = /^\d{4}-\d{2}-\d{2}$/;

/** Whether `text` is a date of the calendar, as `YYYY-MM-DD`. */
export function isLocalDate(text: string): text is LocalDate {
  const sec = Date.parse(`${text}T00:00:00Z`) / 1000;
  return LOCAL_DATE.test(text) && !Number.isNaN(sec) && dateOfUtc(sec) === text;
}

/** Whether `zone` names a zone of the IANA time-zone database. */
export function isTimeZone(zone: string): boolean {
  if (zone === '') return false;
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}

/** Civil date in `zone` at an instant (epoch seconds). */
export function localDateAt(epochSec: number, zone: string): LocalDate {
  return dateOfUtc(epochSec + offsetSec(epochSec, zone));
}

/** Minutes since local midnight by the clock on the wall, 0–1439. */
export function localMinuteAt(epochSec: number, zone: string): number {
  const localSec = epochSec + offsetSec(epochSec, zone);
  return Math.floor((localSec - Math.floor(localSec / DAY_SEC) * DAY_SEC) / 60);
}

/** Weekday of a civil date: 0 Monday … 6 Sunday. */
export function weekdayOf(date: LocalDate): number {
  return (new Date(`${date}T00:00:00Z`).getUTCDay() + 6) % 7;
}

/** The civil date `days` later (earlier when negative). */
export function addDays(date: LocalDate, days: number): LocalDate {
  return dateOfUtc(Date.parse(`${date}T00:00:00Z`) / 1000 + days * DAY_SEC);
}

function dateOfUtc(epochSec: number): LocalDate {
  return new Date(epochSec * 1000).toISOString().slice(0, 10);
}

/** Every civil date from `from` until before `to`. */
export function datesBetween(from: LocalDate, to: LocalDate): LocalDate[] {
  const dates: LocalDate[] = [];
  for (let date = from; date < to; date = addDays(date, 1)) dates.push(date);
  return dates;
}

/**
 * Instant (epoch seconds) at which the clock on the wall shows `minutes` after midnight of `date` in `zone`.
 * A time that the spring change skips is taken with the offset before the change, so it falls just after it;
 * of a time that the autumn change repeats, the first one. `minutes` may be 1440 or more (the next day's).
 */
export function instantAtSec(date: LocalDate, minutes: number, zone: string): number {
  const shownSec = Date.parse(`${date}T00:00:00Z`) / 1000 + minutes * 60;
  const offsets = [offsetSec(shownSec - DAY_SEC, zone), offsetSec(shownSec + DAY_SEC, zone)] as const;
  const possible = offsets
    .map((offset) => ({ sec: shownSec - offset, offset }))
    .filter(({ sec, offset }) => offsetSec(sec, zone) === offset);
  return possible.length > 0 ? Math.min(...possible.map(({ sec }) => sec)) : shownSec - offsets[0];
}

/** Instant (epoch seconds) at which a civil date begins in `zone`. */
export function startOfDaySec(date: LocalDate, zone: string): number {
  return instantAtSec(date, 0, zone);
}

/** Hours that a civil date has in `zone`: 24, or other on the days of a clock change. */
export function hoursOfDay(date: LocalDate, zone: string): number {
  return (startOfDaySec(addDays(date, 1), zone) - startOfDaySec(date, zone)) / 3600;
}
