import { DateTime } from 'luxon';

const NEARBY_SEC = 6 * 3600;

/**
 * A window in words, in the network's zone: `on Tuesday 17 March 2026 between 03:10 and 03:40`. Where the clocks change
 * within the window or within six hours of it, each time carries its distance from universal time.
 */
export function windowInWords(fromSec: number, toSec: number, zone: string): string {
  const from = DateTime.fromSeconds(fromSec, { zone, locale: 'en-GB' });
  const to = DateTime.fromSeconds(toSec, { zone, locale: 'en-GB' });
  const clock = clockChangeMinutes(fromSec, toSec, zone) === 0 ? 'HH:mm' : `HH:mm '(UTC'Z')'`;
  const date = 'cccc d LLLL yyyy';
  if (from.hasSame(to, 'day')) {
    return `on ${from.toFormat(date)} between ${from.toFormat(clock)} and ${to.toFormat(clock)}`;
  }
  return `from ${from.toFormat(`${date}, ${clock}`)}, to ${to.toFormat(`${date}, ${clock}`)}`;
}

/** By how many minutes the clocks go forward (back: negative) within a window or six hours of it; 0 when they do not. */
export function clockChangeMinutes(fromSec: number, toSec: number, zone: string): number {
  const offset = (sec: number) => DateTime.fromSeconds(sec, { zone }).offset;
  return offset(toSec + NEARBY_SEC) - offset(fromSec - NEARBY_SEC);
}

/** The weekday on which a window begins, in its plural: `Tuesdays`. */
export function weekdaysInWords(fromSec: number, zone: string): string {
  return `${DateTime.fromSeconds(fromSec, { zone, locale: 'en-GB' }).toFormat('cccc')}s`;
}
