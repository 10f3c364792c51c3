import { DateTime } from 'luxon';
import { addDays, hoursOfDay, localDateAt, type LocalDate } from './zone';

/** A civil date on which the clock changes, and the hours it has. */
export interface ClockChange {
  date: LocalDate;
  hours: number;
}

const MOST_DAYS_SEARCHED = 62;

/** Clock changes on the dates that a span touches; spans longer than two months name none. */
export function clockChangesIn(fromSec: number, toSec: number, zone: string): ClockChange[] {
  if (toSec - fromSec > MOST_DAYS_SEARCHED * 86_400) return [];
  if (isSameOffsetThroughout(fromSec, toSec, zone)) return [];
  const changes: ClockChange[] = [];
  const last = localDateAt(toSec - 1, zone);
  for (let date = localDateAt(fromSec, zone); date <= last; date = addDays(date, 1)) {
    const hours = hoursOfDay(date, zone);
    if (hours !== 24) changes.push({ date, hours });
  }
  return changes;
}

/** Whether the clock on the wall shows this very time again, or has shown it before, on this date. */
export function isRepeatedHour(sec: number, zone: string): boolean {
  return DateTime.fromSeconds(sec, { zone }).getPossibleOffsets().length > 1;
}

/** "GMT", "BST", "CEST", or "GMT+9" where English has no name for the offset in force. */
export function zoneAbbreviationAt(sec: number, zone: string): string {
  return DateTime.fromSeconds(sec, { zone, locale: 'en-GB' }).toFormat('ZZZZ');
}

function isSameOffsetThroughout(fromSec: number, toSec: number, zone: string): boolean {
  const offsetAt = (sec: number) => DateTime.fromSeconds(sec, { zone }).offset;
  return offsetAt(fromSec) === offsetAt(toSec - 1);
}
