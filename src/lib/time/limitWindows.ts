import type { PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { clockOf, clockWindows, rollingWindows, type ClockWindow, type LimitWindow } from './clockWindows';
import { isDateOf, type DateRule } from './limitDates';
import { periodsOf } from './periods';
import { addDays, instantAtSec, localDateAt, localMinuteAt, type LocalDate } from './zone';

/** What decides when windows of a limit's version are. */
export interface WindowRule extends DateRule {
  /** `length`: `windowMin`; `hours`: `fromMin` to `toMin` of each date, one window; `den`: all periods of a date together. */
  averaging: '15min' | '1h' | 'day' | 'evening' | 'night' | 'length' | 'hours' | 'den';
  /** Minutes of a window of averaging `length`, else null. */
  windowMin: number | null;
  /** Rolling windows begin every so many minutes of the clock; null: fixed windows. */
  stepMin: number | null;
  /**
   * Local clock, minutes after midnight, between which a window must begin, or which are the window; null: all day. `toMin` before
   * `fromMin`: across midnight.
   */
  fromMin: number | null;
  toMin: number | null;
  effectiveFromSec: number;
  /** Windows must begin before it; null: without an end. */
  effectiveToSec: number | null;
}

/** The zone and the periods of day that a network has at an instant, epoch seconds. */
export type ClockInForce = (sec: number) => { timeZone: string; scheme: PeriodScheme };

/**
 * Windows of a limit's version that begin in `fromSec <= t < toSec`, ascending: of a length by the clock on the wall, fixed or
 * rolling, or the network's days, evenings and nights, or one of its own hours each date; on its weekdays and holidays (of the
 * local date on which the window begins), within its clock times (across midnight where they end before they begin), while the
 * version is in force.
 */
export function limitWindows(
  rule: WindowRule,
  fromSec: number,
  toSec: number,
  clockInForce: ClockInForce,
): LimitWindow[] {
  const { timeZone } = clockInForce(fromSec);
  const lastDate = addDays(localDateAt(toSec, timeZone), 1);
  const windows: LimitWindow[] = [];
  for (let date = addDays(localDateAt(fromSec, timeZone), -1); date <= lastDate; date = addDays(date, 1)) {
    if (!isDateOf(rule, date)) continue;
    for (const { startSec, endSec, clockMin } of candidatesOf(date, rule, clockInForce)) {
      const isAsked = fromSec <= startSec && startSec < toSec;
      if (isAsked && isWithinClock(clockMin, rule) && isInForce(startSec, rule))
        windows.push({ startSec, endSec });
    }
  }
  return windows;
}

/** Minutes of a window by the clock; null for a period of day and for hours of its own. */
function lengthMinOf({ averaging, windowMin }: Pick<WindowRule, 'averaging' | 'windowMin'>): number | null {
  if (averaging === '15min') return 15;
  if (averaging === '1h') return 60;
  return averaging === 'length' ? windowMin : null;
}

function candidatesOf(date: LocalDate, rule: WindowRule, clockInForce: ClockInForce): ClockWindow[] {
  const { timeZone } = clockInForce(Date.parse(`${date}T12:00:00Z`) / 1000);
  const { timeZone: zone, scheme } = clockInForce(instantAtSec(date, 0, timeZone));
  const lengthMin = lengthMinOf(rule);
  if (lengthMin !== null) {
    const { stepMin } = rule;
    const clock = clockOf(date, zone);
    return stepMin === null ? clockWindows(clock, lengthMin) : rollingWindows(clock, lengthMin, stepMin);
  }
  if (rule.averaging === 'hours') return hoursWindow(date, rule, zone);
  if (rule.averaging === 'den') return periodsWindow(date, scheme, zone);
  return periodsOf(date, scheme, zone)
    .filter(({ kind }) => kind === rule.averaging)
    .map((period) => ({
      startSec: period.fromSec,
      endSec: period.toSec,
      clockMin: localMinuteAt(period.fromSec, zone),
    }));
}

/** All periods of a date together, from the beginning of its day to the end of its night. */
function periodsWindow(date: LocalDate, scheme: PeriodScheme, zone: string): ClockWindow[] {
  const periods = periodsOf(date, scheme, zone);
  const [first, last] = [periods[0], periods.at(-1)];
  if (!first || !last) return [];
  return [{ startSec: first.fromSec, endSec: last.toSec, clockMin: localMinuteAt(first.fromSec, zone) }];
}

/** The hours of a date, to the next one where they end before they begin; none where the clock was put forward over them. */
export function hoursWindow(
  date: LocalDate,
  { fromMin, toMin }: Pick<WindowRule, 'fromMin' | 'toMin'>,
  zone: string,
): ClockWindow[] {
  if (fromMin === null || toMin === null) throw new RangeError('A window of its own hours has none.');
  const startSec = instantAtSec(date, fromMin, zone);
  const endSec = instantAtSec(date, toMin > fromMin ? toMin : toMin + 1440, zone);
  return endSec > startSec ? [{ startSec, endSec, clockMin: fromMin }] : [];
}

function isWithinClock(clockMin: number, { averaging, fromMin, toMin }: WindowRule): boolean {
  if (averaging === 'hours' || fromMin === null || toMin === null) return true;
  return fromMin < toMin ? fromMin <= clockMin && clockMin < toMin : clockMin >= fromMin || clockMin < toMin;
}

function isInForce(startSec: number, { effectiveFromSec, effectiveToSec }: WindowRule): boolean {
  return startSec >= effectiveFromSec && (effectiveToSec === null || startSec < effectiveToSec);
}
