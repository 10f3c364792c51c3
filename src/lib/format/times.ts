import { addDays, localDateAt, startOfDaySec, type LocalDate } from '#lib/time/zone';
import { isRepeatedHour, zoneAbbreviationAt } from '#lib/time/clockChange';
import { civilFormatter } from './civilFormatter';

/** Which span is meant: half-open, epoch seconds. */
export interface Span {
  fromSec: number;
  toSec: number;
}

/** "12:00" on the wall; seconds only where there are some; the zone's abbreviation only in an hour that comes twice. */
export function formatClock(sec: number, zone: string): string {
  const style = sec % 60 === 0 ? 'clock' : 'clockSeconds';
  const clock = civilFormatter(style, zone).format(sec * 1000);
  return isRepeatedHour(sec, zone) ? `${clock} ${zoneAbbreviationAt(sec, zone)}` : clock;
}

/** "Tue 17 March 2026" of an instant in a zone. */
export function formatDate(sec: number, zone: string): string {
  return plain(civilFormatter('date', zone).format(sec * 1000));
}

/** "Tue 17 March 2026" of a civil date. */
export function formatLocalDate(date: LocalDate): string {
  return formatDate(startOfDaySec(date, 'UTC'), 'UTC');
}

/** "Tue 17 March 2026, 12:00". The zone is named once per view, not here. */
export function formatInstant(sec: number, zone: string): string {
  return `${formatDate(sec, zone)}, ${formatClock(sec, zone)}`;
}

/** "17 Mar", for axes. */
export function formatDayMonth(sec: number, zone: string): string {
  return civilFormatter('dayMonth', zone).format(sec * 1000);
}

/** "17 Mar 12:00" for narrow columns. */
export function formatInstantShort(sec: number, zone: string): string {
  return `${formatDayMonth(sec, zone)} ${formatClock(sec, zone)}`;
}

/** "March 2026" of a month `YYYY-MM`. */
export function formatMonth(month: string): string {
  return civilFormatter('month', 'UTC').format(Date.parse(`${month}-01T00:00:00Z`));
}

/**
 * A period in words: "March 2026", "Tue 17 March 2026", "Mon 16 March to Sun 22 March 2026", "Tue 17 March 2026, 12:00 to
 * Wed 18 March, 24:00". A period that ends at midnight ends at 24:00 of the day before.
 */
export function formatPeriod({ fromSec, toSec }: Span, zone: string): string {
  const first = localDateAt(fromSec, zone);
  const last = localDateAt(toSec - 1, zone);
  const isWholeDays =
    fromSec === startOfDaySec(first, zone) && toSec === startOfDaySec(addDays(last, 1), zone);
  if (isWholeDays && first.endsWith('-01') && addDays(last, 1) === nextMonthOf(first)) {
    return formatMonth(first.slice(0, 7));
  }
  if (isWholeDays && first === last) return formatLocalDate(first);
  if (isWholeDays) return `${fromDate(first, last)} to ${formatLocalDate(last)}`;
  const end = toSec === startOfDaySec(addDays(last, 1), zone) ? '24:00' : formatClock(toSec, zone);
  const from = `${formatLocalDate(first)}, ${formatClock(fromSec, zone)}`;
  if (first === last) return `${from} to ${end}`;
  return `${from} to ${first.slice(0, 4) === last.slice(0, 4) ? withoutYear(last) : formatLocalDate(last)}, ${end}`;
}

/** "Europe/London (GMT)", or both abbreviations where the clock changes within the span. */
export function formatZone(zone: string, { fromSec, toSec }: Span): string {
  const names = new Set([zoneAbbreviationAt(fromSec, zone), zoneAbbreviationAt(toSec - 1, zone)]);
  return `${zone} (${[...names].join(', then ')})`;
}

function fromDate(first: LocalDate, last: LocalDate): string {
  return first.slice(0, 4) === last.slice(0, 4) ? withoutYear(first) : formatLocalDate(first);
}

function withoutYear(date: LocalDate): string {
  return formatLocalDate(date).slice(0, -5);
}

function nextMonthOf(date: LocalDate): LocalDate {
  return `${addDays(`${date.slice(0, 7)}-28`, 4).slice(0, 7)}-01`;
}

const plain = (text: string) => text.replace(',', '');
