import { type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { limitWindows, type WindowRule } from '#lib/time/limitWindows';
import { clipRun, joinRuns, type Run } from './runs';
import { type TimeView } from './timeView';

/** A limit as the level trace draws it: one version of it, A-weighted level or maximum. */
export interface StripLimit extends WindowRule {
  id: number;
  name: string;
  metric: 'LAeq' | 'LAFmax';
  averaging: Exclude<WindowRule['averaging'], 'den'>;
  thresholdDb: number;
}

/** The network's clock and periods of day from an instant on. */
export interface ClockSetting {
  effectiveFromSec: number;
  timeZone: string;
  scheme: PeriodScheme;
}

/** A limit with the stretches of the view in which it holds. */
export interface LimitLine {
  limit: StripLimit;
  runs: readonly Run[];
}

const WEEK_SEC = 7 * 86_400;

/** The whole weeks about a view: times of validity are worked out for them, so that moving the view a little costs nothing. */
export function wholeWeeks({ fromSec, toSec }: TimeView): TimeView {
  return {
    fromSec: Math.floor(fromSec / WEEK_SEC) * WEEK_SEC,
    toSec: Math.ceil(toSec / WEEK_SEC) * WEEK_SEC,
  };
}

/** The limits that hold at some time of a view. */
export function limitLinesOf(
  limits: readonly StripLimit[],
  view: TimeView,
  clocks: readonly ClockSetting[],
): LimitLine[] {
  return limits
    .map((limit) => ({ limit, runs: timesOfValidity(limit, view, clocks) }))
    .filter(({ runs }) => runs.length > 0);
}

const LONGEST_DRAWN_SEC = 100 * 86_400;
/** A day of its own hours, with the hour of a clock change. */
const LONGEST_WINDOW_SEC = 25 * 3600;

/**
 * Stretches of the view in which a limit holds: its windows, as they are judged. `clocks`: the network's in order of their
 * beginning.
 */
export function timesOfValidity(limit: StripLimit, view: TimeView, clocks: readonly ClockSetting[]): Run[] {
  const { fromSec, toSec } = view;
  const [first] = clocks;
  if (toSec - fromSec > LONGEST_DRAWN_SEC || !first) return [];
  const clockInForce = (sec: number) => clocks.findLast((one) => one.effectiveFromSec <= sec) ?? first;
  const windows = limitWindows(limit, fromSec - LONGEST_WINDOW_SEC, toSec, clockInForce);
  // Where the network changed its zone, windows of one date may begin after those of the next.
  const runs = windows
    .map(({ startSec, endSec }) => ({ fromSec: startSec, toSec: endSec }))
    .sort((a, b) => a.fromSec - b.fromSec);
  return joinRuns(runs).flatMap((run) => clipRun(run, view) ?? []);
}
