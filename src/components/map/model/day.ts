import {
  addDays,
  instantAtSec,
  localDateAt,
  localMinuteAt,
  startOfDaySec,
  type LocalDate,
} from '#lib/time/zone';

export const QUARTER_SEC = 900;

/** A local day's quarter-hours up to now: half-open, epoch seconds. */
export interface DayOfQuarters {
  date: LocalDate;
  fromSec: number;
  /** End of the last quarter-hour that has passed. */
  toSec: number;
  isToday: boolean;
}

/** The day that an instant falls in, as far as it has passed. */
export function dayOf(atSec: number, zone: string, nowSec: number): DayOfQuarters {
  const date = localDateAt(atSec, zone);
  const endSec = startOfDaySec(addDays(date, 1), zone);
  const passedSec = quarterBefore(nowSec);
  const isToday = endSec > passedSec;
  return { date, fromSec: startOfDaySec(date, zone), toSec: isToday ? passedSec : endSec, isToday };
}

/**
 * The quarter-hour of another date with the same time on the clock; null (now) where it has not passed yet, or where the date
 * cannot be read.
 */
export function sameClockOn(date: LocalDate, atSec: number, zone: string, nowSec: number): number | null {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(date)) return null;
  const minute = Math.floor(localMinuteAt(atSec, zone) / 15) * 15;
  const sec = instantAtSec(date, minute, zone);
  return Number.isFinite(sec) && sec >= 0 && sec + QUARTER_SEC <= nowSec ? sec : null;
}

/** Beginning of the quarter-hour that an instant falls in. */
export function quarterBefore(sec: number): number {
  return Math.floor(sec / QUARTER_SEC) * QUARTER_SEC;
}
