import type { LimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { LimitWindow } from '#lib/time/clockWindows';
import { limitWindows } from '#lib/time/limitWindows';

export type { LimitWindow } from '#lib/time/clockWindows';
export { hoursWindow } from '#lib/time/limitWindows';

export type WindowRule = Pick<
  LimitVersion,
  | 'averaging'
  | 'windowMin'
  | 'stepMin'
  | 'weekdays'
  | 'holidays'
  | 'holidayDates'
  | 'fromMin'
  | 'toMin'
  | 'effectiveFromSec'
  | 'withdrawnAt'
>;

/**
 * Windows of a limit's version that begin in `fromSec <= t < toSec`, as `limitWindows` has them, until the limit is withdrawn. A
 * later version of the limit is the caller's to look out for. `timeline`: the network's settings in order of their beginning.
 */
export function windowsOf(
  { withdrawnAt, ...rule }: WindowRule,
  fromSec: number,
  toSec: number,
  timeline: NetworkSettings[],
): LimitWindow[] {
  const effectiveToSec = withdrawnAt && withdrawnAt.getTime() / 1000;
  return limitWindows({ ...rule, effectiveToSec }, fromSec, toSec, (sec) => pickSettings(timeline, sec));
}
