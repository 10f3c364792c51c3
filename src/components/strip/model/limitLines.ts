import { type PeriodKind, type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { periodsOverlapping } from '#lib/time/periods';
import { addDays, datesBetween, instantAtSec, localDateAt, weekdayOf } from '#lib/time/zone';
import { clipRun, joinRuns, type Run } from './runs';
import { type TimeView } from './timeView';

/** A limit as the level trace draws it: one version of it, A-weighted level or maximum. */
export interface StripLimit {
  id: number;
  name: string;
  metric: 'LAeq' | 'LAFmax';
  averaging: '15min' | '1h' | 'length' | 'hours' | PeriodKind;
  /** Of averaging `length`, minutes. */
  windowMin?: number | null;
  /** Of rolling windows. */
  stepMin?: number | null;
  thresholdDb: number;
  /** Bit 0 Monday … bit 6 Sunday. */
  weekdays: number;
  /** Local clock, minutes after midnight; null: all day. `toMin` before `fromMin`: across midnight. */
  fromMin: number | null;
  toMin: number | null;
  effectiveFromSec: number;
  /** Null: still in force. */
  effectiveToSec: number | null;
}

const LONGEST_DRAWN_SEC = 100 * 86_400;

/** Stretches of the view in which a limit holds: its times of day on its weekdays, or its period of day. */
export function timesOfValidity(
  limit: StripLimit,
  view: TimeView,
  scheme: PeriodScheme,
  zone: string,
): Run[] {
  if (view.toSec - view.fromSec > LONGEST_DRAWN_SEC) return [];
  const inForce = clipRun(view, {
    fromSec: limit.effectiveFromSec,
    toSec: limit.effectiveToSec ?? Infinity,
  });
  if (!inForce) return [];
  return joinRuns(windowsOf(limit, inForce, scheme, zone)).flatMap((run) => clipRun(run, inForce) ?? []);
}

function windowsOf(limit: StripLimit, view: Run, scheme: PeriodScheme, zone: string): Run[] {
  const { averaging } = limit;
  if (averaging === 'day' || averaging === 'evening' || averaging === 'night') {
    return periodsOverlapping(view.fromSec, view.toSec, scheme, zone).filter(
      (period) => period.kind === averaging && holdsOn(limit, period.date),
    );
  }
  const fromMin = limit.fromMin ?? 0;
  const endMin = limit.toMin === null || limit.toMin > fromMin ? (limit.toMin ?? 1440) : limit.toMin + 1440;
  const first = addDays(localDateAt(view.fromSec, zone), -1);
  return datesBetween(first, addDays(localDateAt(view.toSec, zone), 1))
    .filter((date) => holdsOn(limit, date))
    .map((date) => ({
      fromSec: instantAtSec(date, fromMin, zone),
      toSec: instantAtSec(date, endMin, zone),
    }));
}

function holdsOn(limit: StripLimit, date: string): boolean {
  return (limit.weekdays & (1 << weekdayOf(date))) !== 0;
}
