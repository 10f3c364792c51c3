import type { LimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { periodsOf } from '#lib/time/periods';
import { QUARTER_SEC } from '#lib/time/quarters';
import {
  addDays,
  localDateAt,
  localMinuteAt,
  startOfDaySec,
  weekdayOf,
  type LocalDate,
} from '#lib/time/zone';

/** A window that a limit looks at: half-open, epoch seconds. */
export interface LimitWindow {
  startSec: number;
  endSec: number;
}

export type WindowRule = Pick<
  LimitVersion,
  'averaging' | 'weekdays' | 'fromMin' | 'toMin' | 'effectiveFromSec' | 'withdrawnAt'
>;

interface Candidate extends LimitWindow {
  /** Local clock at its beginning, minutes after midnight. */
  clockMin: number;
}

const DAY_SEC = 86_400;

/**
 * Windows of a limit's version that begin in `fromSec <= t < toSec`, ascending: quarter-hours and hours by the clock on the wall,
 * or the network's days, evenings and nights; on its weekdays (of the local date on which the window begins), within its clock
 * times (across midnight where they end before they begin), while the version is in force. A later version of the limit is the
 * caller's to look out for. `timeline`: the network's settings in order of their beginning.
 */
export function windowsOf(
  rule: WindowRule,
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): LimitWindow[] {
  const { timeZone } = pickSettings(timeline, fromSec);
  const lastDate = addDays(localDateAt(toSec, timeZone), 1);
  const windows: LimitWindow[] = [];
  for (let date = addDays(localDateAt(fromSec, timeZone), -1); date <= lastDate; date = addDays(date, 1)) {
    if ((rule.weekdays & (1 << weekdayOf(date))) === 0) continue;
    for (const { startSec, endSec, clockMin } of candidatesOf(date, rule, timeline)) {
      const isAsked = fromSec <= startSec && startSec < toSec;
      if (isAsked && isWithinClock(clockMin, rule) && isInForce(startSec, rule))
        windows.push({ startSec, endSec });
    }
  }
  return windows;
}

function candidatesOf(date: LocalDate, { averaging }: WindowRule, timeline: NetworkSettings[]): Candidate[] {
  const { timeZone } = pickSettings(timeline, Date.parse(`${date}T12:00:00Z`) / 1000);
  const dayFrom = startOfDaySec(date, timeZone);
  const { timeZone: zone, scheme } = pickSettings(timeline, dayFrom);
  if (averaging === '15min') return clockWindows(date, zone, 15);
  if (averaging === '1h') return clockWindows(date, zone, 60);
  return periodsOf(date, scheme, zone)
    .filter(({ kind }) => kind === averaging)
    .map((period) => ({
      startSec: period.fromSec,
      endSec: period.toSec,
      clockMin: localMinuteAt(period.fromSec, zone),
    }));
}

/**
 * Quarter-hours, or hours, by the clock of a civil date. They tile it: an hour that a clock change cuts off (in zones that
 * change by half an hour) is a window of what elapsed of it, and an hour that comes twice is two windows.
 */
function clockWindows(date: LocalDate, zone: string, stepMin: number): Candidate[] {
  const dayFrom = startOfDaySec(date, zone);
  const dayTo = startOfDaySec(addDays(date, 1), zone);
  // Without a clock change the clock is elapsed time; with one it is asked at each quarter-hour.
  const clockAt =
    dayTo - dayFrom === DAY_SEC
      ? (sec: number) => (sec - dayFrom) / 60
      : (sec: number) => localMinuteAt(sec, zone);
  const windows: Candidate[] = [];
  let lastHourSec = NaN;
  for (let startSec = dayFrom; startSec < dayTo; startSec += QUARTER_SEC) {
    const clockMin = clockAt(startSec);
    /** When this quarter-hour's hour would have begun without a change. */
    const hourSec = startSec - (clockMin % stepMin) * 60;
    const last = windows.at(-1);
    if (last && hourSec === lastHourSec) last.endSec += QUARTER_SEC;
    else windows.push({ startSec, endSec: startSec + QUARTER_SEC, clockMin });
    lastHourSec = hourSec;
  }
  return windows;
}

function isWithinClock(clockMin: number, { fromMin, toMin }: WindowRule): boolean {
  if (fromMin === null || toMin === null) return true;
  return fromMin < toMin ? fromMin <= clockMin && clockMin < toMin : clockMin >= fromMin || clockMin < toMin;
}

function isInForce(startSec: number, { effectiveFromSec, withdrawnAt }: WindowRule): boolean {
  return startSec >= effectiveFromSec && (withdrawnAt === null || startSec * 1000 < withdrawnAt.getTime());
}
