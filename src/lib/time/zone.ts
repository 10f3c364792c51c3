import { DateTime, IANAZone } from 'luxon';

/** A civil date as `YYYY-MM-DD`. */
export type LocalDate = string;

const DAY_SEC = 86_400;
const LOCAL_DATE = /^\d{4}-\d{2}-\d{2}$/;

/** Whether `text` is a date of the calendar, as `YYYY-MM-DD`. */
export function isLocalDate(text: string): text is LocalDate {
  return LOCAL_DATE.test(text) && DateTime.fromISO(text, { zone: 'utc' }).isValid;
}

/** Whether `zone` names a zone of the IANA time-zone database. */
export function isTimeZone(zone: string): boolean {
  return IANAZone.isValidZone(zone);
}

/** Civil date in `zone` at an instant (epoch seconds). */
export function localDateAt(epochSec: number, zone: string): LocalDate {
  return dateOfUtc(epochSec + offsetSec(epochSec, zone));
}

/** Minutes since local midnight by the clock on the wall, 0–1439. */
export function localMinuteAt(epochSec: number, zone: string): number {
  const local = DateTime.fromSeconds(epochSec, { zone });
  return local.hour * 60 + local.minute;
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

/**
 * East of UTC at an instant. Asked at instants only: Luxon's own way from a clock to an instant begins with today's offset and
 * misses the hour after a change where that is far from the offsets of the time (Apia before 2011).
 */
function offsetSec(epochSec: number, zone: string): number {
  const known = offsets.get(zone) ?? new Map<number, number>();
  offsets.set(zone, known);
  const remembered = known.get(epochSec);
  if (remembered !== undefined) return remembered;
  const offset = IANAZone.create(zone).offset(epochSec * 1000) * 60;
  if (known.size >= MOST_OFFSETS) known.clear();
  known.set(epochSec, offset);
  return offset;
}

/** A page asks for the same midnights again and again, and the formatter that tells an offset is slow. */
const offsets = new Map<string, Map<number, number>>();
const MOST_OFFSETS = 20_000;

/** Instant (epoch seconds) at which a civil date begins in `zone`. */
export function startOfDaySec(date: LocalDate, zone: string): number {
  return DateTime.fromISO(date, { zone }).startOf('day').toUnixInteger();
}

/** Hours that a civil date has in `zone`: 24, or other on the days of a clock change. */
export function hoursOfDay(date: LocalDate, zone: string): number {
  return (startOfDaySec(addDays(date, 1), zone) - startOfDaySec(date, zone)) / 3600;
}
