import type { NewLimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { addDays, localDateAt } from '#lib/time/zone';
import type { Span } from '../levels/spans';
import { hoursWindow } from './windows';

/** The longest that lies between the beginning of hours of a background and that of a window that looks back at them, seconds. */
export const BACKGROUND_REACH_SEC = 3 * 86_400;

type BackgroundRule = Pick<NewLimitVersion, 'metric' | 'backgroundFromMin' | 'backgroundToMin'>;

/** Whether the background of a limit is that of hours of its own, not of the window. */
export function hasBackgroundHours({ metric, backgroundFromMin }: BackgroundRule): boolean {
  return metric === 'LAeqLessLA90' && typeof backgroundFromMin === 'number';
}

/**
 * The hours that a window's background is of: the last ones that ended when it begins, or before; null where a limit has none. Hours
 * that the spring change skips as a whole are passed over.
 */
export function backgroundHoursOf(
  rule: BackgroundRule,
  windowStartSec: number,
  timeline: NetworkSettings[],
): Span | null {
  const { backgroundFromMin: fromMin = null, backgroundToMin: toMin = null } = rule;
  if (!hasBackgroundHours(rule) || fromMin === null || toMin === null) return null;
  const { timeZone } = pickSettings(timeline, windowStartSec);
  const today = localDateAt(windowStartSec, timeZone);
  for (const days of [0, -1, -2]) {
    const [hours] = hoursWindow(addDays(today, days), { fromMin, toMin }, timeZone);
    if (hours && hours.endSec <= windowStartSec) return { fromSec: hours.startSec, toSec: hours.endSec };
  }
  return null;
}
