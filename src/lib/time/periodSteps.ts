import { DateTime } from 'luxon';
import { addDays, localDateAt, startOfDaySec, weekdayOf, type LocalDate } from './zone';

export interface Span {
  fromSec: number;
  toSec: number;
}

export type PresetName = 'last-24-h' | 'today' | 'yesterday' | 'this-week' | 'this-month' | 'last-month';

export interface Preset {
  name: PresetName;
  /** Null: the last 24 hours, which an address without a period means. */
  span: Span | null;
}

/** Presets in order; days, weeks (from Monday) and months are whole ones of the zone's calendar. */
export function presetsAt(nowSec: number, zone: string): Preset[] {
  const today = localDateAt(nowSec, zone);
  const monday = addDays(today, -weekdayOf(today));
  const month = `${today.slice(0, 7)}-01`;
  return [
    { name: 'last-24-h', span: null },
    { name: 'today', span: datesSpan(today, addDays(today, 1), zone) },
    { name: 'yesterday', span: datesSpan(addDays(today, -1), today, zone) },
    { name: 'this-week', span: datesSpan(monday, addDays(monday, 7), zone) },
    { name: 'this-month', span: datesSpan(month, addMonths(month, 1), zone) },
    { name: 'last-month', span: datesSpan(addMonths(month, -1), month, zone) },
  ];
}

/**
 * The period before (`direction` −1) or after (+1), touching this one. Whole months step by months and whole dates by dates, so
 * that a clock change does not shift them; anything else steps by its own length.
 */
export function stepPeriod({ fromSec, toSec }: Span, direction: -1 | 1, zone: string): Span {
  const [from, to] = [localDateAt(fromSec, zone), localDateAt(toSec, zone)];
  const isWholeDates = fromSec === startOfDaySec(from, zone) && toSec === startOfDaySec(to, zone);
  if (!isWholeDates) {
    const shiftSec = direction * (toSec - fromSec);
    return { fromSec: fromSec + shiftSec, toSec: toSec + shiftSec };
  }
  if (from.endsWith('-01') && to.endsWith('-01')) {
    const months = direction * monthsBetween(from, to);
    return datesSpan(addMonths(from, months), addMonths(to, months), zone);
  }
  const days = direction * daysBetween(from, to);
  return datesSpan(addDays(from, days), addDays(to, days), zone);
}

function datesSpan(from: LocalDate, to: LocalDate, zone: string): Span {
  return { fromSec: startOfDaySec(from, zone), toSec: startOfDaySec(to, zone) };
}

function addMonths(date: LocalDate, months: number): LocalDate {
  return DateTime.fromISO(date, { zone: 'utc' }).plus({ months }).toFormat('yyyy-MM-dd');
}

function monthsBetween(from: LocalDate, to: LocalDate): number {
  return utc(to).diff(utc(from), 'months').months;
}

function daysBetween(from: LocalDate, to: LocalDate): number {
  return utc(to).diff(utc(from), 'days').days;
}

const utc = (date: LocalDate) => DateTime.fromISO(date, { zone: 'utc' });
