import { offsetSec } from './offset';
import { addDays, hoursOfDay, localDateAt, type LocalDate } from './zone';

/** A civil date on which the clock changes, and the hours it has. */
export interface ClockChange {
  date: LocalDate;
  hours: number;
}

const DAY_SEC = 86_400;
const MOST_DAYS_SEARCHED = 62;

/** Clock changes on the dates that a span touches; spans longer than two months name none. */
export function clockChangesIn(fromSec: number, toSec: number, zone: string): ClockChange[] {
  if (toSec - fromSec > MOST_DAYS_SEARCHED * DAY_SEC) return [];
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
  const shownSec = sec + offsetSec(sec, zone);
  const offsets = new Set([offsetSec(shownSec - DAY_SEC, zone), offsetSec(shownSec + DAY_SEC, zone)]);
  return [...offsets].filter((offset) => offsetSec(shownSec - offset, zone) === offset).length > 1;
}

/** "GMT", "BST", "CEST", or "GMT+9" where English has no name for the offset in force. */
export function zoneAbbreviationAt(sec: number, zone: string): string {
  const formatter = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    timeZoneName: 'short',
    hour: 'numeric',
  });
  const parts = formatter.formatToParts(sec * 1000);
  return parts.find(({ type }) => type === 'timeZoneName')?.value ?? zone;
}

function isSameOffsetThroughout(fromSec: number, toSec: number, zone: string): boolean {
  return offsetSec(fromSec, zone) === offsetSec(toSec - 1, zone);
}
